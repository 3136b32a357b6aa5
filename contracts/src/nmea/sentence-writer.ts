/** Writes sentences as receivers do, for simulators and tests. Absent values leave their field empty. */

export interface GgaValues {
  talker?: string;
  /** ms UTC; a sentence carries the time of day only. */
  time: number;
  latitude: number | null;
  longitude: number | null;
  quality: number;
  satellites: number | null;
  hdop: number | null;
  altitudeM: number | null;
  geoidSeparationM: number | null;
  ageSeconds: number | null;
  stationId: number | null;
  /** Decimals of a minute; five or fewer cannot carry a centimetre. */
  minuteDecimals?: number;
}

/** XOR of all characters, as two capital hexadecimal digits (NMEA 0183, framing). */
export function checksumOf(characters: string): string {
  let sum = 0;
  for (let at = 0; at < characters.length; at++) sum ^= characters.charCodeAt(at);
  return sum.toString(16).toUpperCase().padStart(2, '0');
}

const framed = (characters: string): string => `$${characters}*${checksumOf(characters)}\r\n`;
const pad = (value: number, digits: number): string => String(value).padStart(digits, '0');
const fixed = (value: number | null, decimals: number): string =>
  value === null ? '' : value.toFixed(decimals);

function timeOfDay(time: number): string {
  const date = new Date(time);
  const clock = [date.getUTCHours(), date.getUTCMinutes(), date.getUTCSeconds()].map((part) => pad(part, 2));
  return `${clock.join('')}.${pad(Math.floor(date.getUTCMilliseconds() / 10), 2)}`;
}

/** Degrees as (d)ddmm.mm...: rounded as a whole first, so that 59.999... minutes carry into the next degree. */
export function angleText(degrees: number, degreeDigits: number, minuteDecimals: number): string {
  const scale = 10 ** minuteDecimals;
  const units = Math.round(Math.abs(degrees) * 60 * scale);
  const whole = Math.floor(units / (60 * scale));
  const minutes = (units - whole * 60 * scale) / scale;
  return `${pad(whole, degreeDigits)}${minutes.toFixed(minuteDecimals).padStart(minuteDecimals + 3, '0')}`;
}

function position(latitude: number | null, longitude: number | null, minuteDecimals: number): string {
  if (latitude === null || longitude === null) return ',,,';
  const north = `${angleText(latitude, 2, minuteDecimals)},${latitude < 0 ? 'S' : 'N'}`;
  return `${north},${angleText(longitude, 3, minuteDecimals)},${longitude < 0 ? 'W' : 'E'}`;
}

export function writeGga(values: GgaValues): string {
  const { talker = 'GN', time, latitude, longitude, quality, satellites, hdop, minuteDecimals = 8 } = values;
  const altitude = `${fixed(values.altitudeM, 3)},M,${fixed(values.geoidSeparationM, 3)},M`;
  const station = values.stationId === null ? '' : pad(values.stationId, 4);
  const place = position(latitude, longitude, minuteDecimals);
  const used = satellites === null ? '' : pad(satellites, 2);
  return framed(
    `${talker}GGA,${timeOfDay(time)},${place},${quality},${used},${fixed(hdop, 1)},${altitude},${fixed(values.ageSeconds, 1)},${station}`,
  );
}

export function writeRmc(values: {
  talker?: string;
  time: number;
  latitude: number | null;
  longitude: number | null;
}): string {
  const { talker = 'GN', time, latitude, longitude } = values;
  const date = new Date(time);
  const day = `${pad(date.getUTCDate(), 2)}${pad(date.getUTCMonth() + 1, 2)}${pad(date.getUTCFullYear() % 100, 2)}`;
  const status = latitude === null ? 'V' : 'A';
  return framed(
    `${talker}RMC,${timeOfDay(time)},${status},${position(latitude, longitude, 8)},0.0,0.0,${day},,,`,
  );
}

export function writeGst(values: {
  talker?: string;
  time: number;
  sigmaM: number;
  sigmaAltitudeM: number;
}): string {
  const { talker = 'GN', time, sigmaM, sigmaAltitudeM } = values;
  const sigmas = [sigmaM, sigmaM, sigmaAltitudeM].map((sigma) => sigma.toFixed(3)).join(',');
  return framed(`${talker}GST,${timeOfDay(time)},,,,,${sigmas}`);
}

export function writeZda(values: { talker?: string; time: number }): string {
  const { talker = 'GN', time } = values;
  const date = new Date(time);
  const day = `${pad(date.getUTCDate(), 2)},${pad(date.getUTCMonth() + 1, 2)},${pad(date.getUTCFullYear(), 4)}`;
  return framed(`${talker}ZDA,${timeOfDay(time)},${day},00,00`);
}
