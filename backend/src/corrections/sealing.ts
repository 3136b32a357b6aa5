import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from 'node:crypto';

/** A sealed text cannot be opened: another key, another row, or damaged. */
export class SealBroken extends Error {}

const VERSION = 'v1';
const NONCE_BYTES = 12;
const TAG_BYTES = 16;

/** The key of AES-256-GCM that follows from the server's secret (HKDF, RFC 5869). */
export const sealingKey = (secret: string): Uint8Array =>
  new Uint8Array(hkdfSync('sha256', secret, '', 'hubtack correction passwords', 32));

/**
 * Seals a text with AES-256-GCM (NIST SP 800-38D) under a nonce of its own. `context` says whose it is: a sealed text that is moved to
 * another row cannot be opened there.
 */
export function seal(text: string, key: Uint8Array, context: string): string {
  const nonce = randomBytes(NONCE_BYTES);
  const cipher = createCipheriv('aes-256-gcm', key, nonce);
  cipher.setAAD(Buffer.from(context));
  const sealed = Buffer.concat([nonce, cipher.update(text, 'utf8'), cipher.final(), cipher.getAuthTag()]);
  return `${VERSION}.${sealed.toString('base64url')}`;
}

/** @throws SealBroken */
export function unseal(sealed: string, key: Uint8Array, context: string): string {
  const [version, body] = sealed.split('.');
  const bytes = Buffer.from(body ?? '', 'base64url');
  if (version !== VERSION || bytes.length < NONCE_BYTES + TAG_BYTES)
    throw new SealBroken('not a sealed text');
  const decipher = createDecipheriv('aes-256-gcm', key, bytes.subarray(0, NONCE_BYTES), {
    authTagLength: TAG_BYTES,
  });
  decipher.setAAD(Buffer.from(context));
  decipher.setAuthTag(bytes.subarray(-TAG_BYTES));
  try {
    const text = [decipher.update(bytes.subarray(NONCE_BYTES, -TAG_BYTES)), decipher.final()];
    return Buffer.concat(text).toString('utf8');
  } catch (error) {
    throw new SealBroken('cannot be opened', { cause: error });
  }
}
