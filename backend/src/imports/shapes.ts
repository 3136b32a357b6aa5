import { controlPointBody, type ControlPointBody } from '@hubtack/contracts/control-points/control-point.js';
import { crewBody, type CrewBody, type ShiftPatternDay } from '@hubtack/contracts/crews/crew.js';
import { siteBody, type SiteBody } from '@hubtack/contracts/sites/site.js';
import { CellProblem, daysCell, heightKindCell, numberCell, patternWords, timeCell } from './cells.js';
import type { ListShape } from './plan.js';

const asItIs = (text: string): string => text;
const words = (_field: string, value: unknown): string =>
  value === null || value === undefined ? '' : `${value as string | number | boolean}`;

export const siteShape: ListShape<SiteBody> = {
  schema: siteBody,
  blank: { latitude: null, longitude: null, note: null },
  read: (cell) => ({
    latitude: cell('latitude', numberCell),
    longitude: cell('longitude', numberCell),
    note: cell('note', asItIs),
  }),
  columnOf: (field) => field,
  words,
};

export const controlPointShape: ListShape<ControlPointBody> = {
  schema: controlPointBody,
  blank: { height: null, heightKind: 'ellipsoidal', datum: null, note: null },
  read: (cell) => ({
    latitude: cell('latitude', numberCell),
    longitude: cell('longitude', numberCell),
    height: cell('height', numberCell),
    heightKind: cell('height kind', heightKindCell),
    datum: cell('datum', asItIs),
    note: cell('note', asItIs),
  }),
  columnOf: (field) => (field === 'heightKind' ? 'height kind' : field),
  words,
};

interface CrewSurroundings {
  /** Sites by their id. */
  siteNames: ReadonlyMap<number, string>;
  /** Rates are the manager's business. */
  maySetRates: boolean;
  /** What a new crew begins with. */
  workingWeek: ShiftPatternDay[];
}

export function crewShape({ siteNames, maySetRates, workingWeek }: CrewSurroundings): ListShape<CrewBody> {
  const siteIds = new Map([...siteNames].map(([id, name]) => [name.toLowerCase(), id]));
  const columns: Record<string, string> = { siteId: 'site', hourlyRate: 'hourly rate', pattern: 'days' };
  return {
    schema: crewBody,
    blank: { phone: null, siteId: null, hourlyRate: null, pattern: workingWeek, toleranceProfile: null },
    read: (cell) => ({
      phone: cell('phone', asItIs),
      siteId: cell('site', (text) => {
        const id = siteIds.get(text.toLowerCase());
        if (id === undefined) throw new CellProblem('There is no site of this name: import the sites first');
        return id;
      }),
      hourlyRate: cell('hourly rate', (text, delimiter) => {
        if (!maySetRates) throw new CellProblem('Only a manager sets rates: leave this column out');
        return numberCell(text, delimiter);
      }),
      pattern: readPattern(
        cell('days', daysCell),
        cell('start', timeCell),
        cell('end', timeCell),
        (column, detail) =>
          cell(column, () => {
            throw new CellProblem(detail);
          }),
      ),
    }),
    columnOf: (field) => columns[field] ?? field,
    words: (field, value) => {
      if (field === 'pattern') return patternWords(value as ShiftPatternDay[]);
      if (field === 'siteId') return siteNames.get(value as number) ?? '';
      return words(field, value);
    },
  };
}

function readPattern(
  days: number[] | undefined,
  start: string | undefined,
  end: string | undefined,
  wrong: (column: string, detail: string) => void,
): ShiftPatternDay[] | undefined {
  if (days && start && end) return days.map((weekday) => ({ weekday, start, end }));
  const detail = 'A working week needs days, start and end';
  // Said at one of the cells that are there.
  if (days) wrong('days', detail);
  else if (start) wrong('start', detail);
  else if (end) wrong('end', detail);
  return undefined;
}
