import type { StreamFaults } from './mount-point.js';

/** Faults as a person names them on the command line. */
const named: Record<string, StreamFaults> = {
  silent: { silent: true },
  mute: { mute: true },
  withdrawn: { withdrawn: true },
  noStation: { noStation: true },
  onlyGarbage: { onlyGarbage: true },
  garbage: { garbageBytes: 40 },
  badCrc: { badCrcEvery: 3 },
  stall: { stallAfterFrames: 20 },
  cut: { cutAfterFrames: 20 },
  moved: { movedNorthM: 1.5 },
  otherStation: { stationId: 999 },
};

/** @throws Error for a word that names no fault */
export function streamFaults(words: string): StreamFaults {
  return words.split(',').reduce<StreamFaults>((faults, word) => {
    const fault = named[word];
    if (!fault) throw new Error(`there is no fault ${word}`);
    return { ...faults, ...fault };
  }, {});
}
