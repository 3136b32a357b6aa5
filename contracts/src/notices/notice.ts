import { z } from 'zod';
import type { Role } from '../auth/role.js';
import { id, instantMs } from '../common.js';
import { lostFixKind, type LostFixKind } from '../lost-fixes/lost-fix.js';

/** What can be told of. `advice` goes to the chief whose rover it is about. */
export const noticeSubjects = ['lostFix', 'noFirstFix', 'notHeard', 'mountPoint', 'flag', 'advice'] as const;
export const noticeSubject = z.enum(noticeSubjects);
export type NoticeSubject = z.infer<typeof noticeSubject>;

export const noticeSubjectWords: Record<NoticeSubject, string> = {
  lostFix: 'A lost fix',
  noFirstFix: 'No first fix',
  notHeard: 'A rover not heard since the shift began',
  mountPoint: 'A mount point down',
  flag: 'A crew chief’s flag',
  advice: 'Advice for the own crew',
};

/** `sound`, `speech` and `browser` happen on the device that has them switched on; `mail` goes through the outbox. */
export const noticeWays = ['board', 'sound', 'speech', 'browser', 'mail'] as const;
export const noticeWay = z.enum(noticeWays);
export type NoticeWay = z.infer<typeof noticeWay>;

export const noticeWayWords: Record<NoticeWay, string> = {
  board: 'On the board',
  sound: 'Sound',
  speech: 'Spoken',
  browser: 'Browser notification',
  mail: 'E-mail',
};

/** Tell this person of `subject` by `way`, `afterMinutes` after it is raised and still open. */
export const noticeRule = z.object({
  subject: noticeSubject,
  way: noticeWay,
  afterMinutes: z.number().int().min(0).max(480),
});
export type NoticeRule = z.infer<typeof noticeRule>;
export const noticeRules = z
  .array(noticeRule)
  .max(60)
  .refine((rules) => new Set(rules.map(({ subject, way }) => `${subject} ${way}`)).size === rules.length, {
    message: 'One rule for each subject and way',
  });

const atOnce = (subject: NoticeSubject, way: NoticeWay): NoticeRule => ({ subject, way, afterMinutes: 0 });
const raised: LostFixKind[] = ['lostFix', 'noFirstFix', 'notHeard', 'mountPoint', 'flag'];

/** What a role is told until the person says otherwise. */
export const defaultNoticeRules: Record<Role, NoticeRule[]> = {
  dispatcher: [
    ...raised.flatMap((subject) => [atOnce(subject, 'board'), atOnce(subject, 'sound')]),
    { subject: 'lostFix', way: 'mail', afterMinutes: 10 },
    atOnce('mountPoint', 'mail'),
  ],
  technician: [atOnce('mountPoint', 'board'), atOnce('mountPoint', 'mail')],
  manager: [atOnce('mountPoint', 'board')],
  crewChief: [atOnce('advice', 'board'), atOnce('advice', 'sound')],
};

export const notice = z.object({
  id,
  at: instantMs,
  subject: noticeSubject,
  kind: lostFixKind,
  lostFixId: id,
  text: z.string(),
  ways: z.array(noticeWay),
  seenAt: instantMs.nullable(),
});
export type Notice = z.infer<typeof notice>;
export const noticeList = z.array(notice);
export const noticesSeenBody = z.object({ upTo: id });
