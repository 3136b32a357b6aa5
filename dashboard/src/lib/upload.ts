import { problem } from '@hubtack/contracts/errors/problem.js';
import type { z } from 'zod';
import { ApiError, refreshSignIn } from './api';

interface UploadOptions {
  /** Bytes that have gone, of all. */
  onProgress: (sent: number, whole: number) => void;
  signal: AbortSignal;
}

/** Fetch does not tell how much of a body has gone: the older interface does. */
function sendForm(
  path: string,
  form: FormData,
  { onProgress, signal }: UploadOptions,
): Promise<{ status: number; body: unknown }> {
  return new Promise((resolve, reject) => {
    const request = new XMLHttpRequest();
    const stop = () => request.abort();
    request.open('POST', path);
    request.responseType = 'json';
    request.upload.addEventListener('progress', ({ loaded, total }) => onProgress(loaded, total));
    request.addEventListener('load', () =>
      resolve({ status: request.status, body: request.response as unknown }),
    );
    request.addEventListener('error', () =>
      reject(new ApiError('offline', 'The server cannot be reached, or broke off.')),
    );
    request.addEventListener('abort', () => reject(new DOMException('cancelled', 'AbortError')));
    request.addEventListener('loadend', () => signal.removeEventListener('abort', stop));
    signal.addEventListener('abort', stop, { once: true });
    request.send(form);
  });
}

/** Sends a form with files and reads the answer by the contract; a sign-in that has run out is renewed first. */
export async function upload<T extends z.ZodType>(
  schema: T,
  path: string,
  form: FormData,
  options: UploadOptions,
): Promise<z.infer<T>> {
  // A hundred megabytes are not sent twice because the short-lived sign-in ran out meanwhile.
  await refreshSignIn();
  const { status, body } = await sendForm(path, form, options);
  if (status >= 200 && status < 300) return schema.parse(body);
  const known = problem.safeParse(body);
  if (known.success) throw new ApiError(known.data.code, known.data.detail ?? known.data.title, known.data);
  throw new ApiError('badAnswer', `The server answers ${status}.`);
}
