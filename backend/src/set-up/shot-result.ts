import type { ControlPoint } from '@hubtack/contracts/control-points/control-point.js';
import { enuOf } from '@hubtack/contracts/geodesy/enu.js';
import type { CheckShotLimits } from '@hubtack/contracts/set-up/check-shot-limits.js';
import type { CheckShotMeasure, CheckShotResult } from '@hubtack/contracts/set-up/check-shot.js';
import { antennaAboveGroundM, groundHeight } from '@hubtack/contracts/set-up/pole.js';
import type { SetUpCard } from '@hubtack/contracts/set-up/set-up-card.js';
import type { MeanPosition } from './mean-position.js';

export type TypedMeasure = Extract<CheckShotMeasure, { from: 'typed' }>;
type Point = Pick<ControlPoint, 'latitude' | 'longitude' | 'height' | 'heightKind'>;
type Pole = Pick<SetUpCard, 'poleHeightM' | 'measuringPoint' | 'antennaOffsetM' | 'tilt'>;

const HEIGHT_KINDS: Record<ControlPoint['heightKind'], string> = {
  ellipsoidal: 'above the ellipsoid',
  geoid: 'above the geoid',
};
/** What a rover measured, reduced to the ground and counted as the control point's height is. */
interface Ground {
  latitude: number;
  longitude: number;
  heightM: number | null;
  warnings: string[];
}

/** The mean of some epochs on the ground. Without a set-up card nobody knows how long the pole is. */
export function groundOfMean(mean: MeanPosition, pole: Pole | null, point: Point): Ground {
  const { latitude, longitude } = mean;
  if (!pole) {
    const warnings = ['There is no set-up card of today: the height is not compared.'];
    return { latitude, longitude, heightM: null, warnings };
  }
  const warnings = pole.tilt === 'notCalibrated' ? ['Tilt compensation is on and not calibrated.'] : [];
  const { aboveGeoidM, aboveEllipsoidM } = groundHeight(mean, pole);
  const heightM = point.heightKind === 'geoid' ? aboveGeoidM : aboveEllipsoidM;
  if (heightM === null && point.height !== null)
    warnings.push(
      `The receiver says no height ${HEIGHT_KINDS[point.heightKind]}: the height is not compared.`,
    );
  return { latitude, longitude, heightM, warnings };
}

/** Values read off the controller, which reduces them to the ground itself. */
export function groundOfTyped(typed: TypedMeasure, point: Point): Ground {
  const { latitude, longitude } = typed;
  const isLike = typed.heightKind === point.heightKind;
  const warnings: string[] = [];
  if (point.height !== null && typed.heightM === null)
    warnings.push('No height was typed: the plan alone is checked.');
  else if (point.height !== null && !isLike)
    warnings.push(
      `The control point’s height counts ${HEIGHT_KINDS[point.heightKind]}: the height is not compared.`,
    );
  return { latitude, longitude, heightM: isLike ? typed.heightM : null, warnings };
}

/**
 * Rover minus control point, in the local frame at the control point (IOGP 373-7-2, method 9837), and whether it is within the limits.
 * `mean` null: typed. A height that cannot be compared leaves the plan to decide.
 */
export function shotResult(
  ground: Ground,
  mean: MeanPosition | null,
  pole: Pole | null,
  point: Point,
  limits: CheckShotLimits,
): CheckShotResult {
  const height = point.height ?? 0;
  const isCompared = point.height !== null && ground.heightM !== null;
  const { eastM, northM, upM } = enuOf(
    {
      latitude: ground.latitude,
      longitude: ground.longitude,
      heightM: isCompared ? ground.heightM! : height,
    },
    { latitude: point.latitude, longitude: point.longitude, heightM: height },
  );
  const warnings = [...ground.warnings];
  if (point.height === null) warnings.push('The control point has no height: the plan alone is checked.');
  const horizontalM = Math.hypot(eastM, northM);
  const up = isCompared ? upM : null;
  const isHeightRight = up === null || Math.abs(up) <= limits.verticalM;
  if (!isHeightRight) warnings.push(heightAdvice(point.heightKind, mean !== null));
  return {
    epochs: mean?.epochs ?? null,
    firstAt: mean ? new Date(mean.firstAt).toISOString() : null,
    lastAt: mean ? new Date(mean.lastAt).toISOString() : null,
    latitude: ground.latitude,
    longitude: ground.longitude,
    heightM: ground.heightM,
    poleHeightM: mean && pole ? antennaAboveGroundM(pole) : null,
    difference: { eastM, northM, upM: up },
    scatter: mean?.scatter ?? null,
    horizontalM,
    horizontalLimitM: limits.horizontalM,
    verticalLimitM: limits.verticalM,
    passed: horizontalM <= limits.horizontalM && isHeightRight,
    warnings,
  };
}

/** A sentence counts its altitude from the receiver's own geoid, which may be decimetres from the one that the mark was levelled to. */
const heightAdvice = (kind: ControlPoint['heightKind'], isMeasured: boolean): string =>
  isMeasured && kind === 'geoid'
    ? 'The height is off: read pole height and antenna offset again. If they are right, does the receiver use the geoid of the control point?'
    : 'The height is off: read pole height and antenna offset again.';
