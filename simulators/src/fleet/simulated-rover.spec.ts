import { readText } from '@hubtack/contracts/testing/read-text.js';
import type { GgaSentence } from '@hubtack/contracts/nmea/sentence.js';
import { describe, expect, it } from 'vitest';
import {
  correctionsStopped,
  neverCorrected,
  quiet,
  steady,
  trees,
  type Behaviour,
} from '../scenarios/behaviour.js';
import { scenarios } from '../scenarios/scenarios.js';
import { SimulatedRover } from './simulated-rover.js';

const START = Date.parse('2026-12-01T00:00:00Z');
const site = { latitude: -41.44, longitude: 147.14 };
function run(behaviours: Behaviour[], seconds: number, seed = 1): (GgaSentence | null)[] {
  const rover = new SimulatedRover(site, behaviours, seed);
  return Array.from({ length: seconds }, (_, second) => {
    const text = rover.sentencesAt(START + second * 1000, second);
    const { sentences, faults, noise } = readText(text);
    expect([faults, noise]).toEqual([[], []]);
    return (sentences.find(({ type }) => type === 'gga') as GgaSentence | undefined) ?? null;
  });
}

describe('simulated rovers', () => {
  it('the same seed gives the same sentences, another seed others', () => {
    const text = (seed: number) => {
      const rover = new SimulatedRover(site, scenarios.demo(1)(3).behaviours, seed);
      return Array.from({ length: 100 }, (_, second) =>
        rover.sentencesAt(START + second * 1000, second),
      ).join('');
    };
    expect(text(5)).toBe(text(5));
    expect(text(5)).not.toBe(text(6));
  });
  it('steady: fixed from half a minute on, with fresh corrections, near its site', () => {
    const epochs = run([steady()], 120);
    for (const epoch of epochs.slice(30)) {
      expect(epoch).toMatchObject({ quality: 4 });
      expect(epoch!.ageMs).toBeLessThan(3000);
      expect(Math.abs(epoch!.latitude! - site.latitude)).toBeLessThan(0.005);
    }
  });
  it('one that stands stays within its noise, so that its pole can be checked', () => {
    const { behaviours, stands } = scenarios.demo(1)(2);
    const rover = new SimulatedRover(site, behaviours, 1, stands);
    for (let second = 0; second < 300; second++) {
      const { sentences } = readText(rover.sentencesAt(START + second * 1000, second));
      const epoch = sentences.find(({ type }) => type === 'gga') as GgaSentence;
      if (epoch.quality !== 4) continue;
      expect(Math.abs(epoch.latitude! - site.latitude) * 111_320).toBeLessThan(0.01);
      expect(Math.abs(epoch.altitudeM! - 42)).toBeLessThan(0.01);
    }
  });
  it('trees: satellites fall and the fix goes while corrections stay good, then both come back', () => {
    const epochs = run([steady(), trees(60, 60)], 180);
    const under = epochs.slice(70, 118) as GgaSentence[];
    expect(Math.max(...under.map(({ satellites }) => satellites!))).toBeLessThan(12);
    expect(under.every(({ quality }) => quality !== 4)).toBe(true);
    expect(Math.max(...under.map(({ ageMs }) => ageMs!))).toBeLessThan(3000);
    expect(epochs[170]).toMatchObject({ quality: 4 });
  });
  it('corrections stopped: age rises a second a second, the fix holds for a while, then goes', () => {
    const epochs = run([steady(), correctionsStopped(60, 90)], 200) as GgaSentence[];
    for (const into of [20, 50, 80])
      expect(Math.abs(epochs[60 + into]!.ageMs! / 1000 - into)).toBeLessThan(3);
    expect([80, 100, 140, 190].map((second) => epochs[second]!.quality)).toEqual([4, 5, 2, 4]);
  });
  it('never corrected: a code position without age or station; quiet: nothing at all', () => {
    for (const epoch of run([steady(), neverCorrected()], 60))
      expect(epoch).toMatchObject({ quality: 1, ageMs: null, stationId: null });
    const epochs = run([steady(), quiet(10, 20)], 40);
    expect(epochs.map((epoch) => epoch === null).lastIndexOf(true)).toBe(29);
  });
});
