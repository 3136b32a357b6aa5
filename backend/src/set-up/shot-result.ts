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

const UNKNOWN_KIND: Record<ControlPoint['heightKind'], string> = {
  ellipsoidal: 'above the ellipsoid',
  geoid: 'above the geoid',
};
/** More scatter than this is a pole that moved, or a fix that was none (common practice, no source). */
const SCATTER_M = 0.03;
const FEW_EPOCHS = 5;

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
  const warnings: string[] = [];
  let heightM: number | null = null;
  if (!pole) warnings.push('There is no set-up card of today: the height is not compared.');
  else if (point.height !== null) {
    const { aboveGeoidM, aboveEllipsoidM } = groundHeight(mean, pole);
    heightM = point.heightKind === 'geoid' ? aboveGeoidM : aboveEllipsoidM;
    if (heightM === null)
      warnings.push(
        `The receiver says no height ${UNKNOWN_KIND[point.heightKind]}: the height is not compared.`,
      );
    if (pole.tilt === 'notCalibrated') warnings.push('Tilt compensation is on and not calibrated.');
  }
  if (mean.epochs < FEW_EPOCHS) warnings.push('Few epochs: a mean of ten or more says more.');
  const { scatter } = mean;
  if (scatter && Math.hypot(scatter.eastM, scatter.northM) > SCATTER_M)
    warnings.push('The epochs scatter widely: did the pole stand still?');
  return { latitude, longitude, heightM, warnings };
}

/** Values read off the controller, which reduces them to the ground itself. */
export function groundOfTyped(typed: TypedMeasure, point: Point): Ground {
  const { latitude, longitude } = typed;
  const isLike = typed.heightKind === point.heightKind;
  const warnings =
    typed.heightM !== null && point.height !== null && !isLike
      ? [`The control point’s height counts ${UNKNOWN_KIND[point.heightKind]}: the height is not compared.`]
      : [];
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
    passed: horizontalM <= limits.horizontalM && (up === null || Math.abs(up) <= limits.verticalM),
    warnings,
  };
}
