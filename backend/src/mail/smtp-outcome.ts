/** What the transport's errors say beside their text. */
interface SmtpError {
  code?: unknown;
  command?: unknown;
  responseCode?: unknown;
}

/**
 * What a mail that was not taken has before it: `refused` for good; `later`, this one only; `unreachable`, none would be taken now.
 */
export type SmtpFailure = 'refused' | 'later' | 'unreachable';

const SECOND_MS = 1000;
const FIRST_DELAY_MS = 30 * SECOND_MS;
const LONGEST_DELAY_MS = 15 * 60 * SECOND_MS;
/** Delays are cut by up to this share, so that mails of several servers do not come back as one. */
const JITTER = 0.2;
const CLOSING = 421;

/**
 * Reads an error of the mail transport. RFC 5321, 4.2.1: 4yz may be tried again, 5yz will not change. Only what is said of the recipient or of the
 * mail itself is final: a refused login or sender is put right by whoever runs the server, and the mails are still wanted then.
 */
export function failureOf(error: unknown): SmtpFailure {
  const { code, command, responseCode } = (error ?? {}) as SmtpError;
  const isOfThisMail = command === 'RCPT TO' || command === 'DATA';
  if (typeof responseCode === 'number' && responseCode > 0) {
    if (!isOfThisMail || responseCode === CLOSING) return 'unreachable';
    return responseCode >= 500 ? 'refused' : 'later';
  }
  // The transport itself finds the address or the mail impossible, or over the size that the server takes.
  return code === 'EENVELOPE' || code === 'EMESSAGE' ? 'refused' : 'unreachable';
}

/** How long to wait after the n-th failed attempt: 30 s, 1, 2, 4, 8 and then 15 min, less the jitter. `random` in [0, 1). */
export function retryDelayMs(failedAttempts: number, random: number): number {
  const delay = Math.min(FIRST_DELAY_MS * 2 ** (failedAttempts - 1), LONGEST_DELAY_MS);
  return Math.round(delay * (1 - JITTER * random));
}
