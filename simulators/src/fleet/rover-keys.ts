import { readFileSync } from 'node:fs';
import { z } from 'zod';

export const roverKeysFile = z.array(
  z.object({
    label: z.string(),
    key: z.string(),
    latitude: z.number().nullable(),
    longitude: z.number().nullable(),
  }),
);

export interface FleetRover {
  label: string;
  key: string;
  latitude: number;
  longitude: number;
}

const MIDDLE = { latitude: -41.44, longitude: 147.14 };
/** Simulated sites lie on a grid of this many degrees (about 2 km). */
const GRID = 0.02;

/** Reads keys that the demo left for its fleet. */
export function keysFromFile(file: string): FleetRover[] {
  return roverKeysFile
    .parse(JSON.parse(readFileSync(file, 'utf8')))
    .map(({ label, key, latitude, longitude }) => ({
      label,
      key,
      latitude: latitude ?? MIDDLE.latitude,
      longitude: longitude ?? MIDDLE.longitude,
    }));
}

interface Api {
  url: string;
  email: string;
  password: string;
}

/** Makes crews with a rover and a key each, through the product's own interface. */
export async function makeRovers(api: Api, count: number): Promise<FleetRover[]> {
  const call = async (path: string, body: unknown, cookie?: string) => {
    const response = await fetch(new URL(path, api.url), {
      method: 'POST',
      headers: { 'content-type': 'application/json', ...(cookie ? { cookie } : {}) },
      body: JSON.stringify(body),
    });
    if (!response.ok) throw new Error(`${path} answers ${response.status}: ${await response.text()}`);
    return response;
  };
  const signedIn = await call('/api/auth/sign-in', { email: api.email, password: api.password });
  const cookie = signedIn.headers
    .getSetCookie()
    .map((line) => line.split(';')[0]!)
    .join('; ');
  const made = z.object({ id: z.number() });
  const issued = z.object({ key: z.string() });
  const stamp = Date.now().toString(36).slice(-4);
  const base = {
    name: `Simulated base ${stamp}`,
    address: 'localhost',
    port: 2101,
    mountPoint: `SIM${stamp}`,
    baseLatitude: MIDDLE.latitude,
    baseLongitude: MIDDLE.longitude,
  };
  const source = made.parse(await (await call('/api/correction-sources', base, cookie)).json());
  const rovers: FleetRover[] = [];
  for (let index = 0; index < count; index++) {
    const number = String(index + 1).padStart(3, '0');
    const crewBody = {
      name: `Crew ${stamp}-${number}`,
      phone: null,
      siteId: null,
      hourlyRate: null,
      pattern: [],
    };
    const crew = made.parse(await (await call('/api/crews', crewBody, cookie)).json());
    const label = `S${stamp}-${number}`;
    const roverBody = { label, receiver: 'simulated', serial: null, correctionSourceId: source.id };
    const rover = made.parse(await (await call('/api/rovers', roverBody, cookie)).json());
    await call(`/api/rovers/${rover.id}/assignments`, { crewId: crew.id }, cookie);
    const { key } = issued.parse(await (await call(`/api/rovers/${rover.id}/key`, {}, cookie)).json());
    const latitude = MIDDLE.latitude + (Math.floor(index / 10) - 2) * GRID;
    rovers.push({ label, key, latitude, longitude: MIDDLE.longitude + ((index % 10) - 5) * GRID });
  }
  return rovers;
}
