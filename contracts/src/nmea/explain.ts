import { fixStateOfQuality, fixStateWords } from '../fixes/fix-state.js';
import { FrameReader } from './frame-reader.js';
import { readSentence, type Sentence } from './sentence.js';
import { checksumOf } from './sentence-writer.js';

/** One field of a sentence as people read it. */
export interface ExplainedField {
  name: string;
  raw: string;
  /** What it says, with its unit; "not given" for an empty field, never 0. */
  reading: string;
  /** What to be careful about. */
  warning?: string;
}

export interface ExplainedLine {
  line: number;
  text: string;
  /** Such as "GGA from GN: position and fix quality"; null when it is no sentence. */
  title: string | null;
  sentence: Sentence | null;
  bytes: number;
  checksum: { given: string; computed: string } | null;
  fields: ExplainedField[];
  /** What is wrong, and what to try; null when the sentence can be used. */
  problem: { words: string; advice: string } | null;
}

const titles: Record<string, string> = {
  GGA: 'position and fix quality',
  RMC: 'time, date and movement',
  ZDA: 'time and date',
  GST: 'standard deviations of the position',
  GSA: 'satellites used, dilution of precision',
  GSV: 'satellites in view',
  GLL: 'position',
  VTG: 'course and speed',
  GNS: 'position, mode for each constellation',
  TXT: 'words from the receiver',
};

const names: Record<string, readonly string[]> = {
  GGA: [
    'Time',
    'Latitude',
    'North or south',
    'Longitude',
    'East or west',
    'Quality',
    'Satellites used',
    'HDOP',
    'Antenna above the geoid',
    'Unit',
    'Geoid above the ellipsoid',
    'Unit',
    'Age of corrections',
    'Base station',
  ],
  RMC: [
    'Time',
    'Status',
    'Latitude',
    'North or south',
    'Longitude',
    'East or west',
    'Speed',
    'Course',
    'Date',
    'Magnetic variation',
    'East or west',
    'Mode',
  ],
  ZDA: ['Time', 'Day', 'Month', 'Year', 'Zone hours', 'Zone minutes'],
  GST: [
    'Time',
    'Range residuals',
    'Semi-major axis',
    'Semi-minor axis',
    'Orientation',
    'Sigma latitude',
    'Sigma longitude',
    'Sigma altitude',
  ],
};

const faultAdvice: Record<string, string> = {
  badChecksum:
    'Something changed on the way: check the cable, the baud rate, or that two programs do not write to one port.',
  noChecksum:
    'Switch checksums on in the receiver: without one a flipped digit would move a position unseen.',
  malformed: 'The line is damaged or of another protocol. Set the port to NMEA 0183 only.',
  tooLong: 'No receiver writes lines this long. Is this port NMEA 0183?',
  cutShort: 'The sentence was cut off. At a low baud rate fewer sentences a second help.',
  badField: 'A field does not hold what the standard says. Look at the receiver’s message settings.',
  badQuality: 'The quality must be one digit, 0 to 9. Look at the receiver’s NMEA version.',
};

const qualityWords: Record<number, string> = {
  0: 'no fix',
  1: 'code position without corrections',
  2: 'code position with differential corrections',
  3: 'precise positioning service, a code position here',
  4: 'RTK, ambiguities fixed',
  5: 'RTK, ambiguities not fixed',
  6: 'estimated, no measured position',
  7: 'typed in by hand, no measured position',
  8: 'simulated, no measured position',
  9: 'not in the standard; seen for satellite-based augmentation',
};

const MINUTE_DECIMALS_FOR_CENTIMETRES = 6;

/** Degrees, minutes and seconds; 59.99996 seconds carry into the next minute. */
export function degreesMinutesSeconds(degrees: number, plus: string, minus: string, decimals = 4): string {
  const scale = 10 ** decimals;
  const units = Math.round(Math.abs(degrees) * 3600 * scale);
  const whole = Math.floor(units / (3600 * scale));
  const minutes = Math.floor(units / (60 * scale)) % 60;
  const seconds = (units % (60 * scale)) / scale;
  const padded = seconds.toFixed(decimals).padStart(decimals + 3, '0');
  return `${whole}° ${String(minutes).padStart(2, '0')}′ ${padded}″ ${degrees < 0 ? minus : plus}`;
}

const clock = (ms: number | null): string => {
  if (ms === null) return 'not given';
  const time = new Date(ms % 86_400_000).toISOString().slice(11, 23);
  return `${time} UTC${ms >= 86_400_000 ? ' of the next day (leap second)' : ''}`;
};

/** Reading of one field of a GGA whose sentence was read. */
function ggaReading(
  index: number,
  raw: string,
  sentence: Extract<Sentence, { type: 'gga' }>,
): Pick<ExplainedField, 'reading' | 'warning'> {
  if (raw === '') return { reading: 'not given' };
  const decimals = raw.split('.')[1]?.length ?? 0;
  const coarse =
    decimals < MINUTE_DECIMALS_FOR_CENTIMETRES
      ? { warning: `${decimals} decimals of a minute cannot carry a centimetre; set the receiver to 7 or 8` }
      : {};
  switch (index) {
    case 1:
      return { reading: clock(sentence.timeOfDayMs) };
    case 2:
      return sentence.latitude === null
        ? { reading: 'filler, not a place' }
        : { reading: degreesMinutesSeconds(sentence.latitude, 'N', 'S'), ...coarse };
    case 4:
      return sentence.longitude === null
        ? { reading: 'filler, not a place' }
        : { reading: degreesMinutesSeconds(sentence.longitude, 'E', 'W'), ...coarse };
    case 6: {
      const state = fixStateOfQuality(sentence.quality);
      return { reading: `${fixStateWords[state]}: ${qualityWords[sentence.quality]}` };
    }
    case 7:
      return raw === '12'
        ? { reading: '12', warning: 'many receivers write 12 for any larger number' }
        : { reading: String(sentence.satellites) };
    case 9:
      return {
        reading: `${sentence.altitudeM} m`,
        ...(sentence.geoidSeparationM === null
          ? { warning: 'no geoid separation is given: the ellipsoidal height is not known' }
          : {}),
      };
    case 11:
      return {
        reading: `${sentence.geoidSeparationM} m; ellipsoidal height ${((sentence.altitudeM ?? 0) + (sentence.geoidSeparationM ?? 0)).toFixed(3)} m`,
      };
    case 13: {
      const seconds = (sentence.ageMs ?? 0) / 1000;
      return {
        reading: `${seconds} s`,
        ...(seconds > 10 ? { warning: 'older than 10 s: corrections do not come through' } : {}),
      };
    }
    case 14:
      return { reading: raw };
    default:
      return { reading: raw };
  }
}

function explainFields(text: string, sentence: Sentence): ExplainedField[] {
  const [address = '', ...raws] = text.split(',');
  const formatter = address.slice(-3);
  return raws.map((raw, place) => {
    const name = names[formatter]?.[place] ?? `Field ${place + 1}`;
    const reading =
      sentence.type === 'gga'
        ? ggaReading(place + 1, raw, sentence)
        : { reading: raw === '' ? 'not given' : raw };
    return { name, raw, ...reading };
  });
}

/** Explains one line of text: a technician's second look at what a receiver writes. */
export function explainLine(text: string, line: number): ExplainedLine {
  const trimmed = text.trim();
  const explained: ExplainedLine = {
    line,
    text: trimmed,
    title: null,
    sentence: null,
    bytes: trimmed.length + 2,
    checksum: null,
    fields: [],
    problem: null,
  };
  const start = trimmed.lastIndexOf('$');
  const star = trimmed.indexOf('*', start);
  const characters = trimmed.slice(start + 1, star < 0 ? undefined : star);
  if (start >= 0 && star > 0)
    explained.checksum = {
      given: trimmed.slice(star + 1, star + 3).toUpperCase(),
      computed: checksumOf(characters),
    };
  const bytes = new TextEncoder().encode(`${trimmed}\r\n`);
  const fail = (code: string, words: string) => {
    explained.problem = { words, advice: faultAdvice[code] ?? 'Look at the receiver’s output settings.' };
  };
  const reader = new FrameReader();
  const sink = {
    sentence: (from: Uint8Array, first: number, end: number) => {
      explained.sentence = readSentence(from, first, end);
    },
    fault: (code: string, detail: string) => fail(code, detail),
    noise: () => undefined,
  };
  reader.push(bytes, sink);
  reader.end(sink);
  const address = characters.split(',')[0] ?? '';
  if (start >= 0 && /^[A-Z0-9]{4,8}$/.test(address)) {
    const formatter = address.slice(-3);
    explained.title = address.startsWith('P')
      ? `${address}: a receiver maker’s own sentence`
      : `${formatter} from ${address.slice(0, -3)}: ${titles[formatter] ?? 'not used here'}`;
    explained.fields = explainFields(characters, explained.sentence ?? { type: 'other' });
  } else if (!explained.problem) {
    explained.problem = {
      words: 'this is no NMEA 0183 sentence',
      advice: 'Comments and other protocols are stepped over; they do no harm.',
    };
  }
  if (explained.sentence?.type === 'fault') fail(explained.sentence.code, explained.sentence.detail);
  return explained;
}

export const explainText = (text: string): ExplainedLine[] =>
  text
    .split(/\r\n|\n|\r/)
    .map((line, index) => ({ line, number: index + 1 }))
    .filter(({ line }) => line.trim() !== '')
    .map(({ line, number }) => explainLine(line, number));
