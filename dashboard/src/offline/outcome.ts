import { problem } from '@hubtack/contracts/errors/problem.js';
import { z } from 'zod';
import type { Outcome, Tap } from './tap';

const withId = z.looseObject({ id: z.number().int() });
const withCrew = z.looseObject({ crewId: z.number().int() });

/** As little as shows that our server answered: a phone that was away for weeks must still read a newer one. */
function answerIdOf(kind: Tap['kind'], answer: unknown): number | null {
  switch (kind) {
    case 'flag':
    case 'setUp':
      return withId.safeParse(answer).data?.id ?? null;
    case 'shift':
      return withCrew.safeParse(answer).data?.crewId ?? null;
    case 'photo':
      return typeof answer === 'object' && answer !== null ? 0 : null;
  }
}

function reasonOf(status: number, body: unknown): string {
  const known = problem.safeParse(body);
  if (!known.success) return `The server answers ${status}.`;
  const { title, detail, errors = [] } = known.data;
  return [detail ?? title, ...errors.map((error) => error.detail)].join(' ');
}

const LATER = new Set([408, 429]);

/** What an answer means for a tap. `body` is null when it was not JSON: a sign-on page of a network, say. */
export function outcomeOf(
  kind: Tap['kind'],
  status: number,
  body: unknown,
  retryAfter: string | null,
): Outcome {
  if (status === 401) return { kind: 'signIn' };
  if (status >= 500 || LATER.has(status)) {
    const seconds = Number(retryAfter ?? NaN);
    return { kind: 'later', waitMs: Number.isFinite(seconds) ? seconds * 1000 : null };
  }
  if (status >= 400) return { kind: 'refused', reason: reasonOf(status, body) };
  const answerId = status < 300 ? answerIdOf(kind, body) : null;
  // Something between the phone and the server answered in its place.
  return answerId === null ? { kind: 'later', waitMs: null } : { kind: 'done', answer: body, answerId };
}
