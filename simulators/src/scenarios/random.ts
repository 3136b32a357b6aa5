import { uniformInt } from 'pure-rand/distribution/uniformInt';
import { xoroshiro128plus } from 'pure-rand/generator/xoroshiro128plus';
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';

export const randomOf = (seed: number): RandomGenerator => xoroshiro128plus(seed);

/** A number in [0, 1), from the seeded generator. */
export const chance = (random: RandomGenerator): number => uniformInt(random, 0, 0xff_ffff) / 0x100_0000;

/** A whole number from `least` to `most`, both included. */
export const between = (random: RandomGenerator, least: number, most: number): number =>
  uniformInt(random, least, most);
