import type { FloorRow } from './store.js';

const DAY_MS = 86_400_000;
const number = (text: string | undefined): number | null => (text ? Number(text) : null);
const angle = (text: string | undefined, digits: number, side: string | undefined): number | null => {
  if (!text) return null;
  const value = Number(text.slice(0, digits)) + Number(text.slice(digits)) / 60;
  return side === 'S' || side === 'W' ? -value : value;
};

/** The plain way to read a line: checksum, split, numbers. No dating but the nearest day, no oddities. */
export function readGga(line: string, rover: number, now: number): FloorRow | null {
  const star = line.indexOf('*');
  if (star < 0 || line.slice(3, 6) !== 'GGA') return null;
  let sum = 0;
  for (let at = 1; at < star; at++) sum ^= line.charCodeAt(at);
  if (sum !== parseInt(line.slice(star + 1, star + 3), 16)) return null;
  const fields = line.slice(0, star).split(',');
  const clock = fields[1]!;
  const timeOfDay =
    (Number(clock.slice(0, 2)) * 3600 + Number(clock.slice(2, 4)) * 60) * 1000 +
    Math.round(Number(clock.slice(4)) * 1000);
  const age = number(fields[13]);
  return {
    rover,
    time: Math.round((now - timeOfDay) / DAY_MS) * DAY_MS + timeOfDay,
    quality: Number(fields[6]),
    satellites: number(fields[7]),
    hdop: number(fields[8]),
    ageMs: age === null ? null : age * 1000,
    station: number(fields[14]),
    latitude: angle(fields[2], 2, fields[3]),
    longitude: angle(fields[4], 3, fields[5]),
    altitude: number(fields[9]),
    separation: number(fields[11]),
  };
}

export function readAll(text: string, rover: number): FloorRow[] {
  const now = Date.now();
  const rows: FloorRow[] = [];
  for (const line of text.split('\n')) {
    if (line === '') continue;
    const row = readGga(line, rover, now);
    if (row) rows.push(row);
  }
  return rows;
}
