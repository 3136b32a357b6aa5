import {
  BASE_MOVED_M,
  type CheckedBase,
  type CheckedStream,
  type CheckStepName,
} from '@hubtack/contracts/corrections/check.js';
import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';
import type { ReplyHead } from '../ntrip/reply-reader.js';
import type { CheckTarget } from './run-check.js';
import type { Look } from './stream-look.js';

interface Failure {
  step: CheckStepName;
  seen: string;
  toTry: string;
}
interface Verdict {
  passed: boolean;
  seen: string;
  toTry: string;
  warnings: string[];
}

const ASK_OPERATOR = 'Ask the operator of the caster.';

/** What an answer that is no stream means (RTCM 10410.0, sections 2, 4 and 5; HTTP for version 2). */
export function judgeRefusal(head: ReplyHead, { mountPoint, user }: CheckTarget): Failure {
  const contentType = head.headers.get('content-type') ?? '';
  // An unknown or withdrawn mount point is answered with the table, not with an error.
  if (head.kind === 'table' || (head.status === 200 && /sourcetable/i.test(contentType)))
    return {
      step: 'mountPoint',
      seen: `The caster answers with its source table: it has no mount point ${mountPoint} just now.`,
      toTry: 'Compare it letter by letter. If it is right, the base has been withdrawn: ask the operator.',
    };
  if (head.status === 401 || (head.kind === 'error' && /password|login|auth/i.test(head.firstLine)))
    return {
      step: 'login',
      seen: user === null ? 'The caster asks for a login.' : 'The caster refuses the login.',
      toTry:
        user === null
          ? 'Write user and password.'
          : 'Check user and password letter by letter: capitals, O and 0, l and 1, a space at the end. Is the account used on another rover, or run out?',
    };
  if (head.status === 403)
    return {
      step: 'login',
      seen: `The account may not use ${mountPoint}.`,
      toTry: 'Ask the operator what the account is for.',
    };
  if (head.status === 404 || (head.kind === 'error' && /mount/i.test(head.firstLine)))
    return {
      step: 'mountPoint',
      seen: `The caster does not know ${mountPoint} (“${head.firstLine}”).`,
      toTry: 'Compare it letter by letter with the list of mount points.',
    };
  if (head.status === 409)
    return {
      step: 'login',
      seen: 'The caster says that the account is in use already (409).',
      toTry: 'Many accounts serve one rover at a time: ask who uses it.',
    };
  if (head.headers.has('content-encoding'))
    return {
      step: 'data',
      seen: 'The stream comes compressed, which nobody asked for and no rover reads.',
      toTry: ASK_OPERATOR,
    };
  if (head.status !== null && head.status >= 300 && head.status < 400)
    return {
      step: 'login',
      seen: `The caster sends us on to ${head.headers.get('location')?.slice(0, 200) ?? 'another address'}.`,
      toTry: 'Casters do not do that: check the address.',
    };
  return {
    step: 'data',
    seen: `The caster gives no stream: “${head.firstLine}”.`,
    toTry: 'Try again in a minute. If it stays so, ask the operator.',
  };
}

/** Nothing came: a network that waits for a position, or a base that is down. */
export function judgeSilence(
  { head, end }: Look,
  { sendPosition, mountPoint }: CheckTarget,
  listed: MountPoint | null,
  hasSent: boolean,
): Failure {
  const wants = listed?.wantsPosition === true || listed?.isNetwork === true;
  if (wants && !hasSent)
    return {
      step: 'position',
      seen: sendPosition
        ? 'The network waits for the rover’s position, and there is none to send.'
        : 'The network waits for the rover’s position, and none is sent.',
      toTry: sendPosition
        ? 'Choose a site or a rover that the check is made for.'
        : 'Switch on “send position”, here and on the rover.',
    };
  if (head === null)
    return {
      step: 'login',
      seen:
        end === 'closed'
          ? 'The caster closed the connection without an answer.'
          : 'The caster took the request and said nothing.',
      toTry: 'Try the other NTRIP version. If it stays so, ask the operator.',
    };
  return {
    step: 'data',
    seen:
      end === 'closed'
        ? `${mountPoint} is there, and the caster closed the stream before anything came.`
        : `${mountPoint} is there, and nothing comes.`,
    toTry: hasSent
      ? 'The base may be down, or the position lies outside the network: ask the operator.'
      : 'The base is down, or it waits for a position: ask the operator, or switch on “send position”.',
  };
}

/** More frames with a wrong CRC than this share are a fault of the way, not a single error. */
const BAD_SHARE = 0.05;

export function judgeData({ end, lookedMs }: Look, stream: CheckedStream): Verdict {
  const { frames, badFrames, otherBytes, bytes, bytesPerSecond } = stream;
  const warnings: string[] = [];
  if (badFrames > 0) warnings.push(`${badFrames} frames were dropped: their CRC is wrong`);
  if (otherBytes > 0 && frames > 0) warnings.push(`${otherBytes} bytes lie between the frames`);
  const seconds = Math.max(1, Math.round(lookedMs / 1000));
  const fail = (seen: string, toTry: string): Verdict => ({ passed: false, seen, toTry, warnings });
  if (end === 'closed' || bytes === 0)
    return fail(
      `The caster closed the stream after ${seconds} s and ${bytes} bytes.`,
      'Is the account used by another rover at the same time? Else ask the operator.',
    );
  if (frames === 0)
    return fail(
      `${bytes} bytes came in ${seconds} s, and no RTCM 3 frame among them.`,
      'The mount point sends another format: choose one with RTCM 3.',
    );
  if (end === 'stalled')
    return fail(
      `The stream stopped after ${frames} frames: nothing has come since.`,
      'Try again. If it stops again, the base or its link is bad: ask the operator, or choose the next nearest.',
    );
  if (badFrames / (frames + badFrames) > BAD_SHARE)
    return fail(
      `${badFrames} of ${frames + badFrames} frames are damaged.`,
      'The base or its link is bad: ask the operator, or choose the next nearest.',
    );
  return {
    passed: true,
    seen: `${Math.round(bytesPerSecond)} bytes/s, ${frames} frames in ${seconds} s.`,
    toTry: '',
    warnings,
  };
}

/** Data came: what is left to say about the position. */
export function judgePosition(
  { sendPosition }: CheckTarget,
  listed: MountPoint | null,
  hasSent: boolean,
): Pick<Verdict, 'seen' | 'warnings'> {
  const wants = listed?.wantsPosition === true;
  if (hasSent)
    return {
      seen: wants ? 'Needed, and sent.' : 'Sent.',
      warnings: wants ? [] : ['the source table does not ask for a position: it could be left out'],
    };
  if (sendPosition)
    return { seen: 'None was sent: the check was made for no place.', warnings: ['rovers will send theirs'] };
  return {
    seen: wants ? 'The table asks for one; data came without.' : 'Not needed.',
    warnings: wants ? ['switch on “send position”: the network may stop without it'] : [],
  };
}

/** Ground that bases stand on, metres above the ellipsoid. */
const LOWEST_M = -1000;
const HIGHEST_M = 10_000;
/** Beyond this a single base serves badly (common practice, no source). */
const FAR_M = 20_000;
const km = (metres: number): string => `${(metres / 1000).toFixed(1)} km`;

export function judgeBase(base: CheckedBase): Verdict {
  const { stationId, distanceM, isVirtual, movedM, stationBefore } = base;
  const warnings: string[] = [];
  const at = `Station ${stationId}${distanceM === null ? '' : `, ${km(distanceM)} away`}.`;
  if (isVirtual) warnings.push('a virtual base lies near the rover: its distance says little about quality');
  else if (distanceM !== null && distanceM > FAR_M)
    warnings.push('far for a single base: expect longer waits and less precision');
  const changed =
    'Find out why before anybody measures on: every point moves with the base. Check into control.';
  if (base.heightM < LOWEST_M || base.heightM > HIGHEST_M)
    return {
      passed: false,
      seen: `Station ${stationId} says that it stands ${km(base.heightM)} above the ellipsoid: that is no place for a base.`,
      toTry: 'The base has not been told where it stands. Ask its operator, and measure nothing with it.',
      warnings,
    };
  if (movedM !== null && movedM > BASE_MOVED_M)
    return {
      passed: false,
      seen: `${at} The base has moved by ${movedM < 1000 ? `${movedM.toFixed(3)} m` : km(movedM)} since the last check.`,
      toTry: changed,
      warnings,
    };
  if (stationBefore !== null) warnings.push(`the station id was ${stationBefore} at the last check`);
  return { passed: true, seen: at, toTry: '', warnings };
}
