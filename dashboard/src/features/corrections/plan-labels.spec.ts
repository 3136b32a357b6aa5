import { expect, it } from 'vitest';
import { labelsThatFit, longitudeNear } from './plan-labels';

it('writes the first of two labels that would lie on one another, and both when they do not', () => {
  const at = (x: number, y: number) => ({ x, y, text: 'TANF00' });
  expect([...labelsThatFit([at(0, 0), at(10, 5), at(10, 40), at(200, 5)])]).toEqual([0, 2, 3]);
});

it.each([
  [179, -179, -181],
  [-179, 179, 181],
  [147, 146, 147],
])('longitude %d near %d is %d', (longitude, near, expected) => {
  expect(longitudeNear(longitude, near)).toBeCloseTo(expected);
});
