import { Inject, Injectable } from '@nestjs/common';
import type { CheckReport } from '@hubtack/contracts/corrections/check.js';
import { ENVIRONMENT } from '../config/config.module.js';
import type { Environment } from '../config/environment.js';
import { runCheck, type CheckTarget, type CheckTimeLimits } from './check/run-check.js';
import type { SourceRow } from './correction-source.view.js';
import { CorrectionPasswords } from './passwords.js';
import type { Place } from './places.js';

/** Turns a stored source into what is checked, and runs it. */
@Injectable()
export class CheckRunner {
  /** The usual ones unless somebody is in a hurry, as tests are. */
  limits: Partial<CheckTimeLimits> = {};

  constructor(
    @Inject(ENVIRONMENT) private readonly environment: Environment,
    private readonly passwords: CorrectionPasswords,
  ) {}

  /** @throws SealBroken */
  targetOf(row: SourceRow, place: Place | null): CheckTarget {
    const { decodedStationId, decodedLatitude, decodedLongitude, decodedHeightM } = row;
    const isKnown =
      decodedStationId !== null &&
      decodedLatitude !== null &&
      decodedLongitude !== null &&
      decodedHeightM !== null;
    return {
      address: row.address,
      port: row.port,
      mountPoint: row.mountPoint,
      user: row.user,
      password: row.sealedPassword === null ? null : this.passwords.open(row.id, row.sealedPassword),
      ntripVersion: row.ntripVersion,
      tls: row.tls,
      sendPosition: row.sendPosition,
      expectedFormat: row.expectedFormat,
      place,
      before: isKnown
        ? {
            stationId: decodedStationId,
            latitude: decodedLatitude,
            longitude: decodedLongitude,
            heightM: decodedHeightM,
          }
        : null,
      allowPrivate: this.environment.CASTER_PRIVATE_ADDRESSES === 'allow',
    };
  }

  run(
    target: CheckTarget,
    signal: AbortSignal,
    onReport: (report: CheckReport) => void,
  ): Promise<CheckReport> {
    return runCheck(target, { signal, onReport, limits: this.limits });
  }
}
