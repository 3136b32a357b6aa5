import type { CasterFaults } from './caster-faults.js';
import type { MountPointOptions } from './mount-point.js';

const details = (options: MountPointOptions): string => {
  const station = options.antennaHeightM === undefined ? 1005 : 1006;
  const every = options.stationEverySeconds ?? 1;
  if (options.stream.kind === 'recording') return '1005(1),1077(1),1084(1),1097(1),1127(1),1230(1)';
  return options.stream.kind === 'msm'
    ? `${station}(${every}),1077(1),1087(1),1097(1),1127(1),1230(1)`
    : `1004(1),${station}(${every}),1012(1)`;
};

/** A field as it stands in a record: a semicolon in quotes (RTCM 10410.0, section 6). */
const field = (text: string): string => text.replaceAll(';', '";"');

/** The STR record of a mount point: position to two decimals. */
function record(options: MountPointOptions): string {
  const isLegacy = options.stream.kind === 'legacy';
  const { isNetwork = false } = options;
  return [
    'STR',
    options.name,
    field(options.identifier ?? options.name),
    isLegacy ? 'RTCM 3.1' : 'RTCM 3.3',
    details(options),
    '2',
    isLegacy ? 'GPS+GLO' : 'GPS+GLO+GAL+BDS',
    'PENNYWORT',
    options.country ?? 'AUS',
    options.latitude.toFixed(2),
    options.longitude.toFixed(2),
    isNetwork || options.faults?.waitsForPosition ? '1' : '0',
    isNetwork ? '1' : '0',
    'simulated',
    'none',
    options.login ? 'B' : 'N',
    'N',
    '7200',
    '',
  ].join(';');
}

/** Records such as stand in tables: 0 to 360 degrees are in an example of RTCM 10410.0; the others common practice, no source. */
const ODD_ROWS = [
  'STR;WEST00;Longitude from 0 to 360;RTCM 3.2;1005(10),1077(1);2;GPS;NONE;GBR;53.15;357.85;0;0;simulated;none;B;N;5000;',
  'STR;ZERO00;No position;RTCM 3.2;1005(10),1077(1);2;GPS;NONE;AUS;0.00;0.00;0;0;simulated;none;N;N;5000;',
  'STR;COMMA0;Weir, lower, west bank;RTCM 3.2;1005(10),1077(1);2;GPS;NONE;AUS;-41.40;147.10;0;0;simulated;none;N;N;5000;a";"b',
  'STR;UTF800;Brücke am Übergang – 橋;RTCM3.1;1004(1),1005/1006(10);2;GPS+GLONASS;NONE;DEU;51.00;10.00;0;0;simulated;none;N;N;5000;',
  'STR;SHORT0;Fields missing;RTCM 3.2',
  'STR;EMPTY0;;;;;;;;;;;;;;;;;',
  'STR',
  'XYZ;a record of a kind that nobody knows;1',
  '',
];

export function sourceTable(mountPoints: readonly MountPointOptions[], faults: CasterFaults): string {
  const lines = [
    'CAS;caster.pennywort.example;2101;Simulated caster;Pennywort Surveys;0;AUS;-41.44;147.14;0.0.0.0;0;',
    'NET;PENNYWORT;Pennywort Surveys;B;N;none;none;none;',
    ...mountPoints.map(record),
    ...(faults.oddTable ? ODD_ROWS : []),
  ];
  if (faults.tableWithoutEnd === undefined && !faults.endlessTable) lines.push('ENDSOURCETABLE');
  return lines.map((line) => `${line}\r\n`).join('');
}
