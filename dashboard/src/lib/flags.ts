import { flagBody, flagLabels, lostFix, type FlagBody } from '@hubtack/contracts/lost-fixes/lost-fix.js';

export const flagPath = '/api/lost-fixes';
export const photosPath = (lostFixId: number | ':under') => `/api/lost-fixes/${lostFixId}/photos`;

/** What the sheet asks for; the rover and the time of the tap are known. */
export const flagWords = flagBody.pick({ word: true, note: true });

export const flagCalled = ({ word }: Pick<FlagBody, 'word'>): string =>
  word === 'fixLooksWrong' ? flagLabels[word] : `Lost the fix: ${flagLabels[word].toLowerCase()}`;

/** What a flag gave, or null when a newer server says it in a way this page cannot read. */
export const flagAnswer = (answer: unknown) => lostFix.safeParse(answer).data ?? null;
