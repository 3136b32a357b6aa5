import type { ShiftPatternDay } from '@hubtack/contracts/crews/crew.js';

/** The demo firm of the design: invented, for the demo only. Coordinates lie within 40 km of 41.44 S, 147.14 E. */
export const demoFirm = {
  firmName: 'Pennywort Surveys',
  timeZone: 'Australia/Hobart',
  units: 'metric',
  currency: 'AUD',
  keepPositionsOffShift: false,
} as const;

export const demoPattern: ShiftPatternDay[] = [1, 2, 3, 4, 5].map((weekday) => ({
  weekday,
  start: '07:00',
  end: '15:30',
}));

export const demoSites = [
  { name: 'Tannery Flats subdivision', latitude: -41.4188, longitude: 147.1021 },
  { name: 'Mill Race culvert', latitude: -41.5102, longitude: 147.2044 },
  { name: 'Quarry Bend haul road', latitude: -41.3527, longitude: 147.2318 },
  { name: 'Saltmarsh levee', latitude: -41.3071, longitude: 147.0283 },
  { name: 'Gasworks tram stop', latitude: -41.4363, longitude: 147.1392 },
  { name: 'Hop Kiln Lane boundary', latitude: -41.5631, longitude: 147.0836 },
];

/** `TANF0O` is the demo's mistyped mount point: the letter O where TANF00 has a nought. */
export const demoSources = [
  { name: 'Tannery Flats base', mountPoint: 'TANF00', baseLatitude: -41.4312, baseLongitude: 147.1284 },
  { name: 'Mill Race base', mountPoint: 'MILR00', baseLatitude: -41.5033, baseLongitude: 147.1902 },
  { name: 'Quarry Bend base', mountPoint: 'QUARB2', baseLatitude: -41.3901, baseLongitude: 147.2511 },
  { name: 'Saltmarsh base', mountPoint: 'SALT00', baseLatitude: -41.3207, baseLongitude: 147.0551 },
  { name: 'Network (virtual base)', mountPoint: 'TASNET', baseLatitude: null, baseLongitude: null },
  {
    name: 'Tannery Flats base, as typed on R-07',
    mountPoint: 'TANF0O',
    baseLatitude: null,
    baseLongitude: null,
  },
];

export interface DemoCrew {
  name: string;
  site: string;
  phone: string;
  hourlyRate: number;
  rovers: { label: string; mountPoint: string }[];
  /** How well its past weeks went: share of time with trouble, roughly. */
  trouble: number;
}

/** Telephone numbers are of the range that the Australian regulator keeps for fiction. */
export const demoCrews: DemoCrew[] = [
  {
    name: 'Alder',
    site: 'Tannery Flats subdivision',
    phone: '0491 570 156',
    hourlyRate: 185,
    rovers: [{ label: 'R-01', mountPoint: 'TANF00' }],
    trouble: 0.05,
  },
  {
    name: 'Banksia',
    site: 'Gasworks tram stop',
    phone: '0491 570 157',
    hourlyRate: 185,
    rovers: [{ label: 'R-02', mountPoint: 'TANF00' }],
    trouble: 0.09,
  },
  {
    name: 'Currawong',
    site: 'Quarry Bend haul road',
    phone: '0491 570 158',
    hourlyRate: 195,
    rovers: [{ label: 'R-03', mountPoint: 'QUARB2' }],
    trouble: 0.04,
  },
  {
    name: 'Dogwood',
    site: 'Mill Race culvert',
    phone: '0491 570 159',
    hourlyRate: 185,
    rovers: [{ label: 'R-04', mountPoint: 'MILR00' }],
    trouble: 0.18,
  },
  {
    name: 'Echidna',
    site: 'Saltmarsh levee',
    phone: '0491 570 110',
    hourlyRate: 175,
    rovers: [{ label: 'R-05', mountPoint: 'SALT00' }],
    trouble: 0.15,
  },
  {
    name: 'Fernwren',
    site: 'Hop Kiln Lane boundary',
    phone: '0491 570 313',
    hourlyRate: 175,
    rovers: [{ label: 'R-07', mountPoint: 'TANF0O' }],
    trouble: 0.25,
  },
];

/** In the store, with no crew today. */
export const demoSpares = ['R-06', 'R-08'];
