import type { CookieOptions, Request, Response } from 'express';
import type { Environment } from '../config/environment.js';

export const ACCESS_MINUTES = 10;

/**
 * Names and attributes of the two cookies. Behind https they carry the prefixes that browsers enforce
 * (OWASP ASVS 5.0, 3.3.1); over plain loopback http those would be refused.
 */
export class SignInCookies {
  private readonly secure: boolean;
  private readonly accessName: string;
  private readonly refreshName: string;

  constructor(environment: Pick<Environment, 'PUBLIC_URL'>) {
    this.secure = environment.PUBLIC_URL?.startsWith('https:') ?? false;
    this.accessName = this.secure ? '__Host-hubtack' : 'hubtack';
    this.refreshName = this.secure ? '__Secure-hubtack-refresh' : 'hubtack-refresh';
  }

  access(request: Request): string | null {
    return this.read(request, this.accessName);
  }

  refresh(request: Request): string | null {
    return this.read(request, this.refreshName);
  }

  set(response: Response, tokens: { access: string; refresh: string; endsAt: number; now: number }): void {
    response.cookie(this.accessName, tokens.access, {
      ...this.options('/'),
      maxAge: ACCESS_MINUTES * 60_000,
    });
    response.cookie(this.refreshName, tokens.refresh, {
      ...this.options('/api/auth'),
      maxAge: tokens.endsAt - tokens.now,
    });
  }

  clear(response: Response): void {
    response.clearCookie(this.accessName, this.options('/'));
    response.clearCookie(this.refreshName, this.options('/api/auth'));
  }

  private options(path: string): CookieOptions {
    return { httpOnly: true, sameSite: 'strict', secure: this.secure, path };
  }

  private read(request: Request, name: string): string | null {
    const value: unknown = (request.cookies as Record<string, unknown> | undefined)?.[name];
    return typeof value === 'string' && value.length > 0 ? value : null;
  }
}
