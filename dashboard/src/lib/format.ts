import type { Me } from '@hubtack/contracts/auth/sign-in.js';

const FEET_A_METRE = 1 / 0.3048;
const formats = new Map<string, Intl.DateTimeFormat>();

function format(zone: string, options: Intl.DateTimeFormatOptions): Intl.DateTimeFormat {
  const key = `${zone} ${JSON.stringify(options)}`;
  let known = formats.get(key);
  if (!known) {
    known = new Intl.DateTimeFormat('en-GB', { timeZone: zone, ...options });
    formats.set(key, known);
  }
  return known;
}

export const clockTime = (at: number, zone: string): string =>
  format(zone, { hour: '2-digit', minute: '2-digit', hourCycle: 'h23' }).format(at);
export const clockTimeSeconds = (at: number, zone: string): string =>
  format(zone, { hour: '2-digit', minute: '2-digit', second: '2-digit', hourCycle: 'h23' }).format(at);
export const dayAndTime = (at: number, zone: string): string =>
  format(zone, {
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
  }).format(at);

/** Within a sentence: at 09:12 on the same day, else on 1 Dec 2026, 09:12. */
export function whenWords(at: number, now: number, zone: string): string {
  const day = format(zone, { day: 'numeric', month: 'short', year: 'numeric' });
  return day.format(at) === day.format(now) ? `at ${clockTime(at, zone)}` : `on ${dayAndTime(at, zone)}`;
}

/** Short name of the zone at an instant, such as AEDT. */
export function zoneName(at: number, zone: string): string {
  // en-AU knows the Australian abbreviations, en-US the American ones; en-GB would say GMT+11.
  for (const locale of ['en-AU', 'en-US']) {
    const parts = new Intl.DateTimeFormat(locale, { timeZone: zone, timeZoneName: 'short' }).formatToParts(
      at,
    );
    const name = parts.find(({ type }) => type === 'timeZoneName')?.value ?? '';
    if (/^[A-Z]{2,5}$/.test(name)) return name;
  }
  return zone;
}

/** For a tooltip: the same instant in UTC. */
export const utc = (at: number): string => `${new Date(at).toISOString().slice(0, 19).replace('T', ' ')} UTC`;

/** 45 s, 3 min 12 s, 41 min, 1 h 52 min, 3 d 4 h. Whole units, rounded down: it has lasted at least that long. */
export function duration(ms: number): string {
  const seconds = Math.max(0, Math.floor(ms / 1000));
  const minutes = Math.floor(seconds / 60);
  const hours = Math.floor(minutes / 60);
  if (seconds < 60) return `${seconds} s`;
  if (minutes < 10) return `${minutes} min ${seconds % 60} s`;
  if (hours < 1) return `${minutes} min`;
  if (hours < 48) return `${hours} h ${minutes % 60} min`;
  return `${Math.floor(hours / 24)} d ${hours % 24} h`;
}

/** Working time: hours and minutes, never days. 238 h 15 min, 41 min. */
export function hours(ms: number): string {
  const minutes = Math.max(0, Math.floor(ms / 60_000));
  return minutes < 60 ? duration(ms) : `${Math.floor(minutes / 60)} h ${minutes % 60} min`;
}

/** A distance in the firm's units, with the unit. */
export function distance(metres: number, units: Me['units']): string {
  if (units === 'feet') {
    const feet = metres * FEET_A_METRE;
    return feet < 5280 ? `${Math.round(feet)} ft` : `${(feet / 5280).toFixed(1)} mi`;
  }
  return metres < 1000 ? `${Math.round(metres)} m` : `${(metres / 1000).toFixed(1)} km`;
}

/** Age of corrections with one decimal, as receivers give it. */
export const age = (ms: number): string => `${(ms / 1000).toFixed(1)} s`;
