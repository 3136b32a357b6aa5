import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';

export interface SourceTable {
  mountPoints: MountPoint[];
  /** Records by type: STR, CAS, NET, and others that are ignored. */
  records: Record<'STR' | 'CAS' | 'NET' | 'other', number>;
  /** What is odd about it, in words; each once. */
  oddities: string[];
  /** ENDSOURCETABLE was there. */
  isEnded: boolean;
}

/** Fields of a record: separated by semicolons, one inside a field stands in quotes (RTCM 10410.0, section 6). */
function fieldsOf(line: string): string[] {
  const fields: string[] = [];
  let field = '';
  let isQuoted = false;
  for (const character of line) {
    if (character === '"') isQuoted = !isQuoted;
    else if (character === ';' && !isQuoted) {
      fields.push(field.trim());
      field = '';
    } else field += character;
  }
  return [...fields, field.trim()];
}

const NUMBER = /^[+-]?\d+(\.\d*)?$/;
const numberOf = (text: string | undefined): number | null =>
  text !== undefined && NUMBER.test(text) ? Number(text) : null;
const textOf = (text: string | undefined): string | null => (text ? text : null);
const flagOf = (text: string | undefined): boolean | null =>
  text === '1' ? true : text === '0' ? false : null;

const authentications = { N: 'none', B: 'basic', D: 'digest' } as const;
/** A comma list is possible: the first that we can do. */
function authenticationOf(text: string | undefined): MountPoint['authentication'] {
  const letters = (text ?? '').toUpperCase().split(/[,\s]+/);
  const known = (['N', 'B', 'D'] as const).find((letter) => letters.includes(letter));
  return known ? authentications[known] : null;
}

/** A place of the table: two decimals, and longitudes up to 360 (N1's own examples); 0;0 is what is written when nobody knows. */
function placeOf(
  latitudeText: string | undefined,
  longitudeText: string | undefined,
): { latitude: number; longitude: number } | 'odd' | null {
  const latitude = numberOf(latitudeText);
  const longitude = numberOf(longitudeText);
  if (latitude === null || longitude === null)
    return (latitudeText ?? '') === '' && (longitudeText ?? '') === '' ? null : 'odd';
  if (latitude === 0 && longitude === 0) return null;
  if (Math.abs(latitude) > 90 || longitude < -180 || longitude > 360) return 'odd';
  return { latitude, longitude: longitude > 180 ? longitude - 360 : longitude };
}

/**
 * Reads a source table. Only STR records are decoded, their fields by number, because the number of fields is not fixed; what is missing
 * or odd costs no other record (RTCM 10410.0, section 6).
 */
export function readSourceTable(bytes: Uint8Array): SourceTable {
  const odd = new Map<string, number>();
  const note = (words: string) => odd.set(words, (odd.get(words) ?? 0) + 1);
  const records = { STR: 0, CAS: 0, NET: 0, other: 0 };
  const mountPoints = new Map<string, MountPoint>();
  let isEnded = false;
  const text = textOfTable(bytes, note);
  for (const line of text.split(/\r\n|\r|\n/)) {
    if (line.trim() === '' || isEnded) continue;
    if (line.startsWith('ENDSOURCETABLE')) {
      isEnded = true;
      continue;
    }
    const type = line.slice(0, 4) as 'STR;' | 'CAS;' | 'NET;';
    if (type === 'CAS;') records.CAS++;
    else if (type === 'NET;') records.NET++;
    else if (type === 'STR;') {
      records.STR++;
      const mountPoint = readStr(fieldsOf(line), note);
      if (mountPoint === null) continue;
      if (mountPoints.has(mountPoint.mountPoint)) note('a mount point is listed twice');
      else mountPoints.set(mountPoint.mountPoint, mountPoint);
    } else records.other++;
  }
  if (!isEnded) note('its end is not marked (no ENDSOURCETABLE)');
  const oddities = [...odd].map(([words, count]) => (count > 1 ? `${words} (${count} times)` : words));
  return { mountPoints: [...mountPoints.values()], records, oddities, isEnded };
}

function textOfTable(bytes: Uint8Array, note: (words: string) => void): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    note('it is not UTF-8: read as Western European text');
    return new TextDecoder('windows-1252').decode(bytes);
  }
}

/** Fields after the STR record of RTCM 10410.0; the last one, whatever its number, is free text. */
const FEWEST_FIELDS = 5;

function readStr(fields: string[], note: (words: string) => void): MountPoint | null {
  const name = fields[1] ?? '';
  if (name === '') {
    note('a record names no mount point');
    return null;
  }
  if (fields.length < FEWEST_FIELDS) note('a record has too few fields');
  const place = placeOf(fields[9], fields[10]);
  if (place === 'odd') note('a position cannot be one');
  const known = place === 'odd' ? null : place;
  const bitrate = numberOf(fields[17]);
  return {
    mountPoint: name,
    identifier: textOf(fields[2]),
    format: textOf(fields[3]),
    formatDetails: textOf(fields[4]),
    constellations: textOf(fields[6]),
    network: textOf(fields[7]),
    country: textOf(fields[8]),
    latitude: known?.latitude ?? null,
    longitude: known?.longitude ?? null,
    distanceM: null,
    wantsPosition: flagOf(fields[11]),
    isNetwork: flagOf(fields[12]),
    authentication: authenticationOf(fields[15]),
    fee: fields[16] === 'Y' ? true : fields[16] === 'N' ? false : null,
    bitrate: bitrate === null ? null : Math.round(bitrate),
  };
}
