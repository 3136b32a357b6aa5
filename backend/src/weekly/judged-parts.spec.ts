import type { ToleranceProfile } from '@hubtack/contracts/weekly/tolerance-profile.js';
import { describe, expect, it } from 'vitest';
import { judgedParts } from './tolerance.js';

const profile = (name: string): ToleranceProfile => ({
  name,
  maxAgeSeconds: 10,
  maxHdop: 2,
  minSatellites: 6,
});
const firm = profile('topographic');
const control = profile('control');
const of = (crewId: number | null) => (crewId === 7 ? control : firm);
const words = (shifts: Parameters<typeof judgedParts>[1]) =>
  judgedParts({ start: 0, end: 100 }, shifts, of).map(
    ({ start, end, profile: { name } }) => `${name} ${start}-${end}`,
  );

describe('which profile counts when', () => {
  it('a crew’s own during its shifts, the firm’s between them', () => {
    expect(words([{ crewId: 7, start: 20, end: 60 }])).toEqual([
      'topographic 0-20',
      'control 20-60',
      'topographic 60-100',
    ]);
  });
  it('parts that count alike are one', () => {
    expect(words([{ crewId: 1, start: 20, end: 60 }])).toEqual(['topographic 0-100']);
    expect(words([])).toEqual(['topographic 0-100']);
  });
  it('a rover that changes crew at noon changes the profile', () => {
    expect(
      words([
        { crewId: 1, start: 50, end: null },
        { crewId: 7, start: 10, end: 50 },
      ]),
    ).toEqual(['topographic 0-10', 'control 10-50', 'topographic 50-100']);
  });
  it('a shift that reaches beyond the window is cut to it', () => {
    expect(words([{ crewId: 7, start: -50, end: null }])).toEqual(['control 0-100']);
  });
});
