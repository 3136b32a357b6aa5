import type { CasterFaults } from './caster-faults.js';
import type { StreamFaults } from './mount-point.js';

/** Faults as a person names them on the command line; some take a number. */
const ofStreams: Record<string, (number?: number) => StreamFaults> = {
  silent: () => ({ silent: true }),
  mute: () => ({ mute: true }),
  withdrawn: () => ({ withdrawn: true }),
  refused: () => ({ status: 401 }),
  status: (status = 503) => ({ status }),
  waits: () => ({ waitsForPosition: true }),
  noStation: () => ({ noStation: true }),
  onlyGarbage: () => ({ onlyGarbage: true }),
  garbage: (bytes = 40) => ({ garbageBytes: bytes }),
  badCrc: (every = 3) => ({ badCrcEvery: every }),
  stall: (bytes = 4000) => ({ stallAfterBytes: bytes }),
  cut: (frames = 20) => ({ cutAfterFrames: frames }),
  moved: (metres = 1.5) => ({ movedNorthM: metres }),
  otherStation: (id = 999) => ({ stationId: id }),
};

const ofCaster: Record<string, (number?: number) => CasterFaults> = {
  mute: () => ({ mute: true }),
  noTableEnd: () => ({ tableWithoutEnd: 'closed' }),
  noTableEndKept: () => ({ tableWithoutEnd: 'kept' }),
  endlessTable: () => ({ endlessTable: true }),
  oddTable: () => ({ oddTable: true }),
  tableLogin: () => ({ tableNeedsLogin: true }),
  banner: (bytes = 10_000_000) => ({ bannerBytes: bytes }),
  redirect: () => ({ redirectTo: 'http://elsewhere.pennywort.example/' }),
  gzip: () => ({ gzip: true }),
  webPage: () => ({ webPage: true }),
  noBlankLine: () => ({ noBlankLine: true }),
  moreHeaders: () => ({ extraHeaders: ['Server: simulated/1.0', 'X-Note: a colon: and another'] }),
  version1: () => ({ onlyVersion1: true }),
};

function joined<T extends object>(named: Record<string, (number?: number) => T>, words: string): T {
  const parts = words.split(',').map((word) => {
    const [, name = '', number] = /^(\w+)(?::(\d+(?:\.\d+)?))?$/.exec(word) ?? [];
    if (!Object.hasOwn(named, name)) throw new Error(`there is no fault ${word}`);
    return named[name]!(number === undefined ? undefined : Number(number));
  });
  return Object.assign({}, ...parts) as T;
}

/** @throws Error for a word that names no fault */
export const streamFaults = (words: string): StreamFaults => joined(ofStreams, words);
/** @throws Error for a word that names no fault */
export const casterFaults = (words: string): CasterFaults => joined(ofCaster, words);
export const faultNames = { ofStreams: Object.keys(ofStreams), ofCaster: Object.keys(ofCaster) };
