import { importColumns } from '@hubtack/contracts/imports/import.js';
import { describe, expect, it } from 'vitest';
import { readListText } from './list-text.js';
import { planImport } from './plan.js';
import { controlPointShape, crewShape, siteShape } from './shapes.js';

const quarry = { id: 7, name: 'Quarry', latitude: 47.5, longitude: 8.25, note: 'Ring first' };
const plan = (text: string) => planImport(siteShape, readListText(text, importColumns.sites), [quarry]);

it('adds what is new, changes what is there by its name, leaves what is the same', () => {
  const rows = plan('name,latitude,longitude,note\nBank,47,8,\nquarry,47.6,,\n');
  expect(rows.map(({ action, write }) => ({ action, write }))).toEqual([
    { action: 'add', write: { id: null, body: { name: 'Bank', latitude: 47, longitude: 8, note: null } } },
    {
      action: 'change',
      write: { id: 7, body: { name: 'quarry', latitude: 47.6, longitude: 8.25, note: 'Ring first' } },
    },
  ]);
  expect(rows[1]!.changes).toEqual([
    { column: 'name', before: 'Quarry', after: 'quarry' },
    { column: 'latitude', before: '47.5', after: '47.6' },
  ]);
  expect(plan('name,latitude\nQuarry,47.5\n')).toMatchObject([{ action: 'same', write: null }]);
});
it('a decimal comma, as spreadsheets of many countries write it', () => {
  expect(plan('name;latitude;longitude\nBank;47,125;-8,5')).toMatchObject([
    { write: { body: { latitude: 47.125, longitude: -8.5 } } },
  ]);
});
it.each([
  ['name,latitude\nBank,"47,125"', 'a quoted comma in a list with commas: thousands or a decimal'],
  ['name,latitude\nBank,"47,5"', 'the same, though no thousand looks like that'],
  ['name\tlatitude\nBank\t47,125', 'three figures after the comma, between tabs'],
])('%j: does not guess at a comma (%s)', (text) => {
  expect(plan(text)).toMatchObject([
    { action: 'wrong', errors: [{ column: 'latitude', detail: expect.stringContaining('two ways') }] },
  ]);
});
it('a comma between tabs that cannot be thousands is a decimal one', () => {
  expect(plan('name\tlatitude\nBank\t47,1254')).toMatchObject([{ write: { body: { latitude: 47.1254 } } }]);
});
it('says what is wrong in which column, and writes nothing of that row', () => {
  const rows = plan('name,latitude,longitude\nA,91,8\nB,north,8\n,1,2\nC,1,2\nc,1,2\nD,1,2,3');
  expect(rows.map(({ row, errors }) => ({ row, errors }))).toEqual([
    { row: 2, errors: [{ column: 'latitude', detail: 'Between -90 and 90' }] },
    { row: 3, errors: [{ column: 'latitude', detail: 'Write a number such as 47.25' }] },
    { row: 4, errors: [{ column: 'name', detail: 'Write the name of the site' }] },
    { row: 5, errors: [] },
    { row: 6, errors: [{ column: 'name', detail: 'Row 5 is about this name already' }] },
    { row: 7, errors: [{ column: 'name', detail: 'This row has more cells than the heading has columns' }] },
  ]);
  expect(rows.filter(({ write }) => write !== null)).toHaveLength(1);
});

it('a control point needs its place; the height counts from the ellipsoid where nothing is said', () => {
  const rows = planImport(
    controlPointShape,
    readListText(
      'name,latitude,longitude,height,height kind\nM1,47,8,410.5,\nM2,47,,,geoid\nM3,47,8,1,sea',
      importColumns['control-points'],
    ),
    [],
  );
  expect(rows).toMatchObject([
    { action: 'add', write: { body: { height: 410.5, heightKind: 'ellipsoidal', datum: null } } },
    { action: 'wrong', errors: [{ column: 'longitude', detail: 'This cannot be empty' }] },
    { action: 'wrong', errors: [{ column: 'height kind', detail: 'Write ellipsoidal or geoid' }] },
  ]);
});

describe('crews', () => {
  const workingWeek = [{ weekday: 6, start: '09:00', end: '12:00' }];
  const crews = (text: string, maySetRates = true) =>
    planImport(
      crewShape({ siteNames: new Map([[7, 'Quarry']]), maySetRates, workingWeek }),
      readListText(text, importColumns.crews),
      [],
    );
  it('with site, rate and working week', () => {
    const [row] = crews('name;site;hourly rate;days;start;end\nAlder;QUARRY;95,50;Mon-Wed Fri;7:00;15:30');
    const hours = { start: '07:00', end: '15:30' };
    expect(row!.write?.body).toEqual({
      name: 'Alder',
      phone: null,
      toleranceProfile: null,
      siteId: 7,
      hourlyRate: 95.5,
      pattern: [1, 2, 3, 5].map((weekday) => ({ weekday, ...hours })),
    });
  });
  it.each([
    ['site\nA,Bank', 'site', 'There is no site of this name: import the sites first'],
    ['hourly rate\nA,-1', 'hourly rate', 'Not below zero'],
    ['days,start\nA,Mon-Fri,7:00', 'days', 'A working week needs days, start and end'],
    ['days,start,end\nA,Mo,7:00,8:00', 'days', 'Write days such as Mon-Fri, or Mon Wed Sat'],
    ['days,start,end\nA,Mon,7h,8:00', 'start', 'Write a time such as 07:00'],
    ['phone\nA,ring me', 'phone', 'Digits, spaces, brackets and hyphens only'],
  ])('%#: %s', (text, column, detail) => {
    const [row] = crews(`name,${text}`);
    expect(row).toMatchObject({ action: 'wrong', write: null });
    expect(row!.errors).toContainEqual({ column, detail });
  });
  it('without a working week of its own, the firm’s', () => {
    expect(crews('name\nAlder')[0]!.write?.body.pattern).toEqual(workingWeek);
  });
  it('only a manager sets rates', () => {
    expect(crews('name,hourly rate\nA,95', false)).toMatchObject([
      { errors: [{ column: 'hourly rate', detail: 'Only a manager sets rates: leave this column out' }] },
    ]);
  });
});
