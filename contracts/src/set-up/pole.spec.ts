import { describe, expect, it } from 'vitest';
import { antennaAboveGroundM, groundHeight, tiltError } from './pole.js';

const pole = { poleHeightM: 1.8, measuringPoint: 'mountBottom', antennaOffsetM: 0.093 } as const;

describe('the height of the ground', () => {
  it('is the altitude less pole and offset, and the separation counts towards the ellipsoid', () => {
    const { aboveGeoidM, aboveEllipsoidM } = groundHeight({ altitudeM: 40, geoidSeparationM: -3 }, pole);
    expect(aboveGeoidM).toBeCloseTo(38.107, 9);
    expect(aboveEllipsoidM).toBeCloseTo(35.107, 9);
  });
  it('an offset does not count when the pole was measured up to the phase centre', () => {
    expect(antennaAboveGroundM({ ...pole, measuringPoint: 'phaseCentre' })).toBe(1.8);
  });
  it('is not known without an altitude, and not above the ellipsoid without a separation', () => {
    expect(groundHeight({ altitudeM: null, geoidSeparationM: -3 }, pole)).toEqual({
      aboveGeoidM: null,
      aboveEllipsoidM: null,
    });
    expect(groundHeight({ altitudeM: 40, geoidSeparationM: null }, pole).aboveEllipsoidM).toBeNull();
  });
});

describe('a pole of 2 m that leans', () => {
  // h sin t and h (1 - cos t): computed in the project's own table of field practice.
  it.each([
    [5 / 60, 2.9, 0.0],
    [10 / 60, 5.8, 0.01],
    [20 / 60, 11.6, 0.03],
    [0.5, 17.5, 0.08],
    [1, 34.9, 0.3],
    [2, 69.8, 1.22],
  ])('by %f° costs %f mm across and %f mm in height', (degrees, horizontalMm, verticalMm) => {
    const { horizontalM, verticalM } = tiltError(2, degrees);
    expect(horizontalM * 1000).toBeCloseTo(horizontalMm, 1);
    expect(verticalM * 1000).toBeCloseTo(verticalMm, 2);
  });
});
