import { hash, randomBytes } from 'node:crypto';

/** 256 random bits as text: for refresh tokens, links and rover keys (ASVS 5.0, 7.2.3 asks for 128). */
export const newToken = (): string => randomBytes(32).toString('base64url');

/** What is stored of a token. It has too much entropy to be guessed, so a fast hash is enough. */
export const hashOfToken = (token: string): string => hash('sha256', token, 'hex');
