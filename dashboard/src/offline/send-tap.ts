import { refreshSignIn } from '../lib/api';
import { outcomeOf } from './outcome';
import type { Outcome, Tap } from './tap';

const WORDS_WITHIN_MS = 30_000;
const PHOTO_WITHIN_MS = 180_000;

function formOf(photo: Blob): FormData {
  const form = new FormData();
  form.append('photos', photo, 'photo');
  return form;
}

function post({ id, url, body }: Tap): Promise<Response> {
  const key = { 'idempotency-key': id };
  const isPhoto = body instanceof Blob;
  return fetch(url, {
    method: 'POST',
    credentials: 'same-origin',
    headers: isPhoto ? key : { ...key, 'content-type': 'application/json' },
    body: isPhoto ? formOf(body) : JSON.stringify(body),
    // A request that hangs would hold up the ones behind it.
    signal: AbortSignal.timeout(isPhoto ? PHOTO_WITHIN_MS : WORDS_WITHIN_MS),
  });
}

/** Sends one tap. Never throws: whatever goes wrong on the way means "later". */
export async function sendTap(tap: Tap): Promise<Outcome> {
  try {
    let response = await post(tap);
    if (response.status === 401 && (await refreshSignIn())) response = await post(tap);
    const body: unknown = await response.json().catch(() => null);
    return outcomeOf(tap.kind, response.status, body, response.headers.get('retry-after'));
  } catch {
    return { kind: 'later', waitMs: null };
  }
}
