import { Fields, decimalOf, wholeOf } from './fields.js';

/** Time of day in ms since 00:00 UTC; second 60 is a leap second and reads as the start of the next minute. */
export type TimeOfDayMs = number;
/** Whole days since 1970-01-01. */
export type DayNumber = number;

export const DAY_MS = 86_400_000;

/** GGA: position, quality, satellites, age of corrections. What the receiver left out is null, never 0. */
export interface GgaSentence {
  type: 'gga';
  talker: string;
  timeOfDayMs: TimeOfDayMs | null;
  quality: number;
  satellites: number | null;
  hdop: number | null;
  /** Degrees, north and east positive; null when there is no position (empty, zero-filled, or quality 0). */
  latitude: number | null;
  longitude: number | null;
  /** Antenna above the geoid. */
  altitudeM: number | null;
  /** Geoid above the ellipsoid. */
  geoidSeparationM: number | null;
  ageMs: number | null;
  stationId: number | null;
}

/** RMC and ZDA are read for their date only: GGA is the authority on quality. */
export interface DateSentence {
  type: 'date';
  from: 'RMC' | 'ZDA';
  timeOfDayMs: TimeOfDayMs | null;
  day: DayNumber | null;
  /** RMC status V: the receiver itself does not vouch for it. ZDA has no status. */
  valid: boolean;
}

/** GST: standard deviations of the position of the same instant, metres. */
export interface GstSentence {
  type: 'gst';
  timeOfDayMs: TimeOfDayMs | null;
  sigmaLatitudeM: number | null;
  sigmaLongitudeM: number | null;
  sigmaAltitudeM: number | null;
}

export interface OtherSentence {
  type: 'other';
}

export interface SentenceFault {
  type: 'fault';
  code: 'malformed' | 'badField' | 'badQuality';
  detail: string;
}

export type Sentence = GgaSentence | DateSentence | GstSentence | OtherSentence | SentenceFault;

const OTHER: OtherSentence = { type: 'other' };
const fields = new Fields();
const talkers = new Map<number, string>();

const badField = (detail: string): SentenceFault => ({ type: 'fault', code: 'badField', detail });
const isBad = (value: number | null): boolean => value !== null && Number.isNaN(value);

/**
 * Reads the characters bytes[start, end) of a sentence whose checksum is right.
 * Keyed on the last three letters of the address: the talker may change within one receiver's stream.
 * Proprietary sentences (`P...`) are never read by these tables, whatever their letters.
 * Field meanings after NMEA 0183 as described in "NMEA Revealed" (GGA, RMC, ZDA, GST).
 */
export function readSentence(bytes: Uint8Array, start: number, end: number): Sentence {
  if (bytes[start + 5] !== 44 || bytes[start] === 80) return OTHER;
  const formatter = (bytes[start + 2]! << 16) | (bytes[start + 3]! << 8) | bytes[start + 4]!;
  switch (formatter) {
    case 0x474741:
      return split(bytes, start, end) ?? readGga(talkerOf(bytes, start));
    case 0x524d43:
      return split(bytes, start, end) ?? readRmc();
    case 0x5a4441:
      return split(bytes, start, end) ?? readZda();
    case 0x475354:
      return split(bytes, start, end) ?? readGst();
    default:
      return OTHER;
  }
}

function split(bytes: Uint8Array, start: number, end: number): SentenceFault | null {
  return fields.split(bytes, start, end)
    ? null
    : { type: 'fault', code: 'malformed', detail: 'more fields than any sentence has' };
}

function talkerOf(bytes: Uint8Array, start: number): string {
  const key = (bytes[start]! << 8) | bytes[start + 1]!;
  let talker = talkers.get(key);
  if (talker === undefined) {
    talker = String.fromCharCode(bytes[start]!, bytes[start + 1]!);
    talkers.set(key, talker);
  }
  return talker;
}

/** hhmmss or hhmmss.s...; null when empty, NaN when it is no time of day. */
function timeOfDay(field: number): TimeOfDayMs | null {
  const length = fields.length(field);
  if (length === 0) return null;
  const { bytes } = fields;
  const at = fields.start(field);
  if (length < 6 || (length > 6 && bytes[at + 6] !== 46)) return NaN;
  const hours = wholeOf(bytes, at, at + 2);
  const minutes = wholeOf(bytes, at + 2, at + 4);
  const seconds = wholeOf(bytes, at + 4, at + 6);
  if (!(hours <= 23 && minutes <= 59 && seconds <= 60)) return NaN;
  const fraction = length > 7 ? decimalOf(bytes, at + 6, at + length) : 0;
  return (hours * 3600 + minutes * 60 + seconds) * 1000 + Math.round(fraction * 1000);
}

/** ddmm.mm... or dddmm.mm... in degrees, without sign; NaN when it is no angle up to `limit` degrees. */
function angle(field: number, degreeDigits: number, limit: number): number {
  const { bytes } = fields;
  const at = fields.start(field);
  const end = at + fields.length(field);
  const point = at + degreeDigits + 2;
  if (end < point || (end > point && bytes[point] !== 46)) return NaN;
  const degrees = wholeOf(bytes, at, at + degreeDigits);
  const minutes = decimalOf(bytes, at + degreeDigits, end);
  const value = degrees + minutes / 60;
  return minutes >= 0 && minutes < 60 && value <= limit ? value : NaN;
}

function signedAngle(field: number, degreeDigits: number, limit: number, plus: number, minus: number) {
  const value = angle(field, degreeDigits, limit);
  const side = fields.character(field + 1);
  if (side === plus) return value;
  return side === minus ? -value : NaN;
}

const METRES = 77;
const hasUnit = (field: number): boolean => fields.isEmpty(field) || fields.character(field) === METRES;

function readGga(talker: string): GgaSentence | SentenceFault {
  if (fields.count < 9) return { type: 'fault', code: 'malformed', detail: 'GGA with too few fields' };
  const quality = fields.character(6) - 48;
  if (quality < 0 || quality > 9)
    return { type: 'fault', code: 'badQuality', detail: `quality "${fields.text(6)}" is not one digit` };

  const timeOfDayMs = timeOfDay(1);
  if (isBad(timeOfDayMs)) return badField(`time "${fields.text(1)}"`);
  const satellites = fields.whole(7);
  if (isBad(satellites) || (satellites ?? 0) > 200) return badField(`satellites "${fields.text(7)}"`);
  const hdop = fields.decimal(8);
  if (isBad(hdop) || (hdop ?? 0) < 0) return badField(`HDOP "${fields.text(8)}"`);
  const altitudeM = fields.decimal(9);
  if (isBad(altitudeM) || !hasUnit(10)) return badField(`altitude "${fields.text(9)},${fields.text(10)}"`);
  const geoidSeparationM = fields.decimal(11);
  if (isBad(geoidSeparationM) || !hasUnit(12))
    return badField(`geoid separation "${fields.text(11)},${fields.text(12)}"`);
  const ageSeconds = fields.decimal(13);
  if (isBad(ageSeconds) || (ageSeconds ?? 0) < 0) return badField(`age of corrections "${fields.text(13)}"`);
  const station = fields.whole(14);

  let latitude: number | null = null;
  let longitude: number | null = null;
  const hasPosition = !fields.isEmpty(2) || !fields.isEmpty(4);
  if (quality !== 0 && hasPosition) {
    latitude = signedAngle(2, 2, 90, 78, 83);
    if (Number.isNaN(latitude)) return badField(`latitude "${fields.text(2)},${fields.text(3)}"`);
    longitude = signedAngle(4, 3, 180, 69, 87);
    if (Number.isNaN(longitude)) return badField(`longitude "${fields.text(4)},${fields.text(5)}"`);
    if (latitude === 0 && longitude === 0) latitude = longitude = null;
  }
  return {
    type: 'gga',
    talker,
    timeOfDayMs,
    quality,
    satellites,
    hdop,
    latitude,
    longitude,
    altitudeM,
    geoidSeparationM,
    ageMs: ageSeconds === null ? null : Math.round(ageSeconds * 1000),
    // Some receivers put a name here: not a number is not known.
    stationId: station === null || Number.isNaN(station) ? null : station,
  };
}

/** The date that was reckoned last: a receiver says the same one all day long. */
let lastDate: { year: number; month: number; day: number; number: DayNumber | null } | null = null;

/** Days since 1970 of a calendar date; null when there is no such date. */
export function dayNumber(year: number, month: number, day: number): DayNumber | null {
  if (lastDate?.day === day && lastDate.month === month && lastDate.year === year) return lastDate.number;
  const ms = Date.UTC(year, month - 1, day);
  const date = new Date(ms);
  const exists = date.getUTCMonth() === month - 1 && date.getUTCDate() === day;
  lastDate = { year, month, day, number: Number.isNaN(ms) || !exists ? null : ms / DAY_MS };
  return lastDate.number;
}

function readRmc(): DateSentence | SentenceFault {
  const timeOfDayMs = timeOfDay(1);
  if (isBad(timeOfDayMs)) return badField(`time "${fields.text(1)}"`);
  let day: DayNumber | null = null;
  if (!fields.isEmpty(9)) {
    const at = fields.start(9);
    const { bytes } = fields;
    const year = fields.length(9) === 6 ? wholeOf(bytes, at + 4, at + 6) : NaN;
    // Two-digit year; satellite positioning time begins in 1980.
    day = dayNumber(
      year < 80 ? 2000 + year : 1900 + year,
      wholeOf(bytes, at + 2, at + 4),
      wholeOf(bytes, at, at + 2),
    );
    if (day === null) return badField(`date "${fields.text(9)}"`);
  }
  return { type: 'date', from: 'RMC', timeOfDayMs, day, valid: fields.character(2) === 65 };
}

function readZda(): DateSentence | SentenceFault {
  const timeOfDayMs = timeOfDay(1);
  if (isBad(timeOfDayMs)) return badField(`time "${fields.text(1)}"`);
  const written = !fields.isEmpty(2) && !fields.isEmpty(3) && !fields.isEmpty(4);
  const day = written ? dayNumber(fields.whole(4)!, fields.whole(3)!, fields.whole(2)!) : null;
  if (written && day === null)
    return badField(`date "${fields.text(2)},${fields.text(3)},${fields.text(4)}"`);
  return { type: 'date', from: 'ZDA', timeOfDayMs, day, valid: true };
}

function readGst(): GstSentence | SentenceFault {
  const timeOfDayMs = timeOfDay(1);
  if (isBad(timeOfDayMs)) return badField(`time "${fields.text(1)}"`);
  const [latitude, longitude, altitude] = [fields.decimal(6), fields.decimal(7), fields.decimal(8)];
  if (isBad(latitude) || isBad(longitude) || isBad(altitude))
    return badField('a standard deviation is no number');
  return {
    type: 'gst',
    timeOfDayMs,
    sigmaLatitudeM: latitude,
    sigmaLongitudeM: longitude,
    sigmaAltitudeM: altitude,
  };
}
