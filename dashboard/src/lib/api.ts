import { problem, type Problem, type ProblemCode } from '@hubtack/contracts/errors/problem.js';
import type { z } from 'zod';

/** A refusal by the server, with its stable code; `offline` when it could not be reached at all. */
export class ApiError extends Error {
  constructor(
    readonly code: ProblemCode | 'offline' | 'badAnswer',
    message: string,
    readonly problem: Problem | null = null,
  ) {
    super(message);
  }
}

type Method = 'GET' | 'POST' | 'PUT' | 'DELETE';

async function send(
  method: Method,
  path: string,
  body: unknown,
  headers: Record<string, string> = {},
): Promise<Response> {
  try {
    return await fetch(path, {
      method,
      credentials: 'same-origin',
      ...(body === undefined
        ? {}
        : { headers: { 'content-type': 'application/json', ...headers }, body: JSON.stringify(body) }),
    });
  } catch (cause) {
    throw new ApiError(
      'offline',
      'The server cannot be reached.',
      cause instanceof ApiError ? cause.problem : null,
    );
  }
}

async function errorOf(response: Response): Promise<ApiError> {
  const body: unknown = await response.json().catch(() => null);
  const known = problem.safeParse(body);
  if (known.success) return new ApiError(known.data.code, known.data.detail ?? known.data.title, known.data);
  return new ApiError('badAnswer', `The server answers ${response.status}.`);
}

let refreshing: Promise<boolean> | null = null;

/** Trades the refresh cookie for a new sign-in; several callers at once share one try. False: the sign-in is over. */
export function refreshSignIn(): Promise<boolean> {
  refreshing ??= send('POST', '/api/auth/refresh', undefined)
    .then((response) => {
      if (response.ok) return true;
      if (response.status === 401) return false;
      throw new ApiError('badAnswer', `The server answers ${response.status}.`);
    })
    .finally(() => {
      refreshing = null;
    });
  return refreshing;
}

/** Calls the server. A short-lived sign-in that has run out is renewed once, and the call made again. */
async function call(
  method: Method,
  path: string,
  body?: unknown,
  headers?: Record<string, string>,
): Promise<Response> {
  let response = await send(method, path, body, headers);
  const isAboutSignIn = path.startsWith('/api/auth/') && path !== '/api/auth/me';
  if (response.status === 401 && !isAboutSignIn && (await refreshSignIn()))
    response = await send(method, path, body, headers);
  if (!response.ok) throw await errorOf(response);
  return response;
}

/** Calls the server and reads its answer by the contract. */
export async function api<T extends z.ZodType>(
  schema: T,
  method: Method,
  path: string,
  body?: unknown,
  headers?: Record<string, string>,
): Promise<z.infer<T>> {
  const response = await call(method, path, body, headers);
  const result = schema.safeParse(await response.json());
  if (!result.success)
    throw new ApiError('badAnswer', 'The server answers in a form this page does not know. Reload it.');
  return result.data;
}

/** For calls whose answer has no body. */
export async function apiVoid(method: Method, path: string, body?: unknown): Promise<void> {
  await call(method, path, body);
}
