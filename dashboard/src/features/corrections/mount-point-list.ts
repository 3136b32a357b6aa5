import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';

export const sortings = ['distance', 'name', 'network'] as const;
export type Sorting = (typeof sortings)[number];
export type Authentication = NonNullable<MountPoint['authentication']>;

export const authenticationWords: Record<Authentication, string> = {
  none: 'no login',
  basic: 'login',
  digest: 'login (digest)',
};

export interface MountPointFilter {
  text: string;
  /** Null: any. */
  format: string | null;
  authentication: Authentication | null;
}

export const noFilter: MountPointFilter = { text: '', format: null, authentication: null };

const searched = (one: MountPoint): string =>
  [
    one.mountPoint,
    one.identifier,
    one.network,
    one.country,
    one.format,
    one.formatDetails,
    one.constellations,
  ]
    .join(' ')
    .toLowerCase();

/** Every word must be somewhere in what the table says of a mount point. */
export function filterMountPoints(
  all: readonly MountPoint[],
  { text, format, authentication }: MountPointFilter,
): MountPoint[] {
  const words = text.toLowerCase().split(/\s+/).filter(Boolean);
  return all.filter(
    (one) =>
      (format === null || one.format === format) &&
      (authentication === null || one.authentication === authentication) &&
      words.every((word) => searched(one).includes(word)),
  );
}

const byName = new Intl.Collator('en', { numeric: true, sensitivity: 'base' });
const orders: Record<Sorting, (a: MountPoint, b: MountPoint) => number> = {
  distance: (a, b) => (a.distanceM ?? Infinity) - (b.distanceM ?? Infinity) || 0,
  name: () => 0,
  // Without a network last.
  network: (a, b) => byName.compare(a.network ?? '\uffff', b.network ?? '\uffff'),
};

/** By distance those of unknown place come last; what is equal goes by name. */
export const sortMountPoints = (all: readonly MountPoint[], sorting: Sorting): MountPoint[] =>
  all.toSorted((a, b) => orders[sorting](a, b) || byName.compare(a.mountPoint, b.mountPoint));

/** The formats of a table, the most frequent first. */
export function formatsOf(all: readonly MountPoint[]): string[] {
  const counts = new Map<string, number>();
  for (const { format } of all) if (format !== null) counts.set(format, (counts.get(format) ?? 0) + 1);
  return [...counts].toSorted(([, a], [, b]) => b - a).map(([format]) => format);
}
