import type { CorrectionCheck } from '@hubtack/contracts/corrections/check.js';
import type { CorrectionSource } from '@hubtack/contracts/corrections/correction-source.js';
import type { correctionChecks, correctionSources } from '@hubtack/drizzle/schema/correction-sources.js';

export type SourceRow = typeof correctionSources.$inferSelect;
export type CheckRow = typeof correctionChecks.$inferSelect;

const instant = (ms: number): string => new Date(ms).toISOString();

/** As it may be seen: the password never leaves. */
export function sourceOf(row: SourceRow, lastCheck: CheckRow | undefined): CorrectionSource {
  const { decodedAt, decodedStationId, decodedLatitude, decodedLongitude, decodedHeightM } = row;
  return {
    id: row.id,
    name: row.name,
    address: row.address,
    port: row.port,
    mountPoint: row.mountPoint,
    user: row.user,
    ntripVersion: row.ntripVersion,
    tls: row.tls,
    sendPosition: row.sendPosition,
    expectedFormat: row.expectedFormat,
    watchMinutes: row.watchMinutes,
    baseLatitude: row.baseLatitude,
    baseLongitude: row.baseLongitude,
    hasPassword: row.sealedPassword !== null,
    decodedBase:
      decodedAt === null ||
      decodedStationId === null ||
      decodedLatitude === null ||
      decodedLongitude === null ||
      decodedHeightM === null
        ? null
        : {
            at: instant(decodedAt),
            stationId: decodedStationId,
            latitude: decodedLatitude,
            longitude: decodedLongitude,
            heightM: decodedHeightM,
          },
    lastCheck: lastCheck
      ? {
          id: lastCheck.id,
          at: instant(lastCheck.startedAt),
          status: lastCheck.status,
          passed: lastCheck.passed,
          failedStep: lastCheck.failedStep,
        }
      : null,
    downSince: row.downSince === null ? null : instant(row.downSince),
  };
}

export const checkOf = (row: CheckRow): CorrectionCheck => ({
  ...row.report,
  id: row.id,
  sourceId: row.sourceId,
  status: row.status,
  startedAt: instant(row.startedAt),
  endedAt: row.endedAt === null ? null : instant(row.endedAt),
  by: row.by,
  passed: row.passed,
  failedStep: row.failedStep,
  place: row.place,
});
