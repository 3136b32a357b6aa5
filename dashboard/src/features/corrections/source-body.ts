import type {
  CorrectionSource,
  CorrectionSourceBody,
} from '@hubtack/contracts/corrections/correction-source.js';

/** A source as it would be sent back unchanged; the password, which is left out, stays as it is. */
export const bodyOf = ({
  name,
  address,
  port,
  mountPoint,
  user,
  ntripVersion,
  tls,
  sendPosition,
  expectedFormat,
  watchMinutes,
  baseLatitude,
  baseLongitude,
}: CorrectionSource): CorrectionSourceBody => ({
  name,
  address,
  port,
  mountPoint,
  user,
  ntripVersion,
  tls,
  sendPosition,
  expectedFormat,
  watchMinutes,
  baseLatitude,
  baseLongitude,
});
