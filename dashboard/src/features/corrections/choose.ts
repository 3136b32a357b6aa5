import {
  correctionFormatLabels,
  type CorrectionFormat,
  type CorrectionSource,
  type CorrectionSourceBody,
} from '@hubtack/contracts/corrections/correction-source.js';
import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';

/** Observation messages by RTCM 10403: MSM of GPS, GLONASS, Galileo, SBAS, QZSS, BeiDou and NavIC; before them 1001 to 1012. */
const isMsm = (number: number) => number >= 1071 && number <= 1137 && number % 10 >= 1 && number % 10 <= 7;
const isLegacy = (number: number) => (number >= 1001 && number <= 1004) || (number >= 1009 && number <= 1012);

/** What a source table says of the messages; null when it names no observation message. */
export function formatOf({ formatDetails }: Pick<MountPoint, 'formatDetails'>): CorrectionFormat | null {
  const numbers = (formatDetails?.match(/\b1\d{3}\b/g) ?? []).map(Number);
  const [msm, legacy] = [numbers.some(isMsm), numbers.some(isLegacy)];
  if (msm && legacy) return 'any';
  if (msm) return 'msm';
  return legacy ? 'legacy' : null;
}

export interface Change {
  field: 'mountPoint' | 'sendPosition' | 'expectedFormat';
  name: string;
  before: string;
  after: string;
  body: Partial<CorrectionSourceBody>;
}

const sentWords = (isSent: boolean): string => (isSent ? 'sent' : 'not sent');

/** What choosing a mount point would change in a source. */
export function changesFor(source: CorrectionSource, chosen: MountPoint): Change[] {
  const changes: Change[] = [];
  if (chosen.mountPoint !== source.mountPoint)
    changes.push({
      field: 'mountPoint',
      name: 'Mount point',
      before: source.mountPoint,
      after: chosen.mountPoint,
      body: { mountPoint: chosen.mountPoint },
    });
  const { wantsPosition } = chosen;
  if (wantsPosition !== null && wantsPosition !== source.sendPosition)
    changes.push({
      field: 'sendPosition',
      name: 'Rover’s position',
      before: sentWords(source.sendPosition),
      after: sentWords(wantsPosition),
      body: { sendPosition: wantsPosition },
    });
  const format = formatOf(chosen);
  if (format !== null && format !== source.expectedFormat)
    changes.push({
      field: 'expectedFormat',
      name: 'Format expected',
      before: correctionFormatLabels[source.expectedFormat],
      after: correctionFormatLabels[format],
      body: { expectedFormat: format },
    });
  return changes;
}

/** What to think of before a mount point is taken. */
export function doubtsAbout(source: CorrectionSource, chosen: MountPoint): string[] {
  const doubts: string[] = [];
  const format = formatOf(chosen);
  if (
    format !== null &&
    format !== 'any' &&
    source.expectedFormat !== 'any' &&
    format !== source.expectedFormat
  )
    doubts.push(
      `It sends ${format === 'msm' ? 'MSM' : 'legacy'} messages and the rovers are said to expect the other kind: make sure that they can use them.`,
    );
  if (format === null)
    doubts.push('The table does not say which messages it sends. A check after this shows them.');
  if (chosen.wantsPosition)
    doubts.push(
      'It wants the rover’s position. The operator of the network then sees where the rover is: tell the crews.',
    );
  if (chosen.authentication !== null && chosen.authentication !== 'none' && !source.hasPassword)
    doubts.push('It wants a login, and no password is kept for this source.');
  if (chosen.fee) doubts.push('The operator charges for it.');
  return doubts;
}
