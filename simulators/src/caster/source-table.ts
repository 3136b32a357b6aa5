import type { MountPointOptions } from './mount-point.js';

const details = (options: MountPointOptions): string => {
  const station = options.antennaHeightM === undefined ? 1005 : 1006;
  const every = options.stationEverySeconds ?? 1;
  if (options.stream.kind === 'recording') return '1005(1),1077(1),1084(1),1097(1),1127(1),1230(1)';
  return options.stream.kind === 'msm'
    ? `${station}(${every}),1077(1),1087(1),1097(1),1127(1),1230(1)`
    : `1004(1),${station}(${every}),1012(1)`;
};

/** The STR record of a mount point (RTCM 10410.0, section 6): position to two decimals. */
function record(options: MountPointOptions): string {
  const isLegacy = options.stream.kind === 'legacy';
  return [
    'STR',
    options.name,
    options.identifier ?? options.name,
    isLegacy ? 'RTCM 3.1' : 'RTCM 3.3',
    details(options),
    '2',
    isLegacy ? 'GPS+GLO' : 'GPS+GLO+GAL+BDS',
    'PENNYWORT',
    'AUS',
    options.latitude.toFixed(2),
    options.longitude.toFixed(2),
    options.isNetwork ? '1' : '0',
    options.isNetwork ? '1' : '0',
    'simulated',
    'none',
    options.login ? 'B' : 'N',
    'N',
    '7200',
    '',
  ].join(';');
}

export function sourceTable(mountPoints: readonly MountPointOptions[], isEnded = true): string {
  const lines = [
    'CAS;caster.pennywort.example;2101;Simulated caster;Pennywort Surveys;0;AUS;-41.44;147.14;0.0.0.0;0;',
    'NET;PENNYWORT;Pennywort Surveys;B;N;none;none;none;',
    ...mountPoints.map(record),
  ];
  if (isEnded) lines.push('ENDSOURCETABLE');
  return lines.map((line) => `${line}\r\n`).join('');
}
