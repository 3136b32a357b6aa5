import { distance } from 'fastest-levenshtein';

/** Characters that are read for one another, as the one that stands for both. */
const LOOKS: Record<string, string> = { O: '0', I: '1', L: '1', S: '5', B: '8', Z: '2', _: '-' };
const look = (name: string): string =>
  name.toUpperCase().replaceAll(/./gu, (character) => LOOKS[character] ?? character);

/** Two neighbours changed places: one slip of the finger, though two edits. */
function isTransposed(a: string, b: string): boolean {
  if (a.length !== b.length) return false;
  let at = 0;
  while (at < a.length && a[at] === b[at]) at++;
  return at < a.length && a[at] === b[at + 1] && a[at + 1] === b[at] && a.slice(at + 2) === b.slice(at + 2);
}

/** How far one name is from another, in slips; capitals and look-alikes count for less than one. */
function slips(typed: string, name: string): number {
  if (typed === name) return 0;
  if (typed.toUpperCase() === name.toUpperCase()) return 0.2;
  if (look(typed) === look(name)) return 0.4;
  if (isTransposed(typed.toUpperCase(), name.toUpperCase())) return 0.9;
  const edits = Math.min(
    distance(typed.toUpperCase(), name.toUpperCase()),
    distance(look(typed), look(name)) + 0.3,
  );
  // Somebody who wrote the beginning only has left the rest away.
  return name.toUpperCase().startsWith(typed.toUpperCase()) ? Math.min(edits, 1.5) : edits;
}

/** More slips than this, or than half of the name, is another name. */
const MOST_SLIPS = 3;

/** Names that `typed` may have been meant for, best first. Of equally near ones the nearer in place, when `distanceOf` knows it. */
export function nearestSpellings(
  typed: string,
  names: readonly string[],
  distanceOf: (name: string) => number | null = () => null,
  most = 5,
): string[] {
  const limit = Math.min(MOST_SLIPS, Math.max(1.5, typed.length / 2));
  return names
    .map((name) => ({ name, slips: slips(typed, name), distanceM: distanceOf(name) ?? Infinity }))
    .filter((one) => one.slips <= limit)
    .toSorted((a, b) => a.slips - b.slips || a.distanceM - b.distanceM || (a.name < b.name ? -1 : 1))
    .slice(0, most)
    .map(({ name }) => name);
}
