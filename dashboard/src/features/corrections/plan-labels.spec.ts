import { expect, it } from 'vitest';
import { labelsThatFit, longitudeNear } from './plan-labels';

it('writes no label over another point or over a label that is there', () => {
  const at = (x: number, y: number) => ({ x, y, text: 'TANF00' });
  expect([...labelsThatFit([at(0, 0), at(10, 14), at(10, 40), at(200, 5)])]).toEqual([1, 2, 3]);
  expect([...labelsThatFit([at(0, 0), at(-40, 5), at(200, 5)])]).toEqual([0, 2]);
});

it.each([
  [179, -179, -181],
  [-179, 179, 181],
  [147, 146, 147],
])('longitude %d near %d is %d', (longitude, near, expected) => {
  expect(longitudeNear(longitude, near)).toBeCloseTo(expected);
});
