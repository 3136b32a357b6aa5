/** A caller of the API with a cookie jar of its own, as a browser keeps it. */
export class Client {
  private readonly cookies = new Map<string, string>();

  constructor(readonly url: string) {}

  get cookieHeader(): string {
    return [...this.cookies].map(([name, value]) => `${name}=${value}`).join('; ');
  }

  cookie(name: string): string | undefined {
    return this.cookies.get(name);
  }

  setCookie(name: string, value: string): void {
    this.cookies.set(name, value);
  }

  async call(
    method: string,
    path: string,
    body?: unknown,
    headers: Record<string, string> = {},
  ): Promise<Response> {
    const response = await fetch(new URL(path, this.url), {
      method,
      headers: {
        ...(this.cookies.size > 0 ? { cookie: this.cookieHeader } : {}),
        ...(body === undefined ? {} : { 'content-type': 'application/json' }),
        ...headers,
      },
      ...(body === undefined ? {} : { body: JSON.stringify(body) }),
    });
    for (const line of response.headers.getSetCookie()) {
      const [pair] = line.split(';');
      const at = pair!.indexOf('=');
      const value = pair!.slice(at + 1);
      if (value === '') this.cookies.delete(pair!.slice(0, at));
      else this.cookies.set(pair!.slice(0, at), value);
    }
    return response;
  }

  /** Calls and answers the body; throws with the answer's text when the server refuses. */
  async json<T = never>(method: string, path: string, body?: unknown): Promise<T> {
    const response = await this.call(method, path, body);
    const text = await response.text();
    if (!response.ok) throw new Error(`${method} ${path} answers ${response.status}: ${text}`);
    return (text === '' ? undefined : JSON.parse(text)) as T;
  }

  signIn(email: string, password: string): Promise<Response> {
    return this.call('POST', '/api/auth/sign-in', { email, password });
  }
}

/** A rover with its key. */
export interface TestRover {
  id: number;
  key: string;
}

export async function postSentences(
  url: string,
  key: string,
  body: string | Uint8Array,
  query = '',
): Promise<{ status: number; body: Record<string, unknown> & { accepted: number; code?: string } }> {
  const response = await fetch(new URL(`/api/ingest/nmea${query}`, url), {
    method: 'POST',
    headers: { authorization: `Bearer ${key}`, 'content-type': 'text/plain' },
    body: typeof body === 'string' ? body : new Uint8Array(body),
  });
  return { status: response.status, body: (await response.json()) as never };
}
