/** Names of the RTCM 3 messages that a correction stream is made of. */
const names: Record<number, string> = {
  1001: 'GPS observables, L1',
  1002: 'GPS observables, L1, extended',
  1003: 'GPS observables, L1 and L2',
  1004: 'GPS observables, L1 and L2, extended',
  1005: 'Station position',
  1006: 'Station position and antenna height',
  1007: 'Antenna descriptor',
  1008: 'Antenna descriptor and serial number',
  1009: 'GLONASS observables, L1',
  1010: 'GLONASS observables, L1, extended',
  1011: 'GLONASS observables, L1 and L2',
  1012: 'GLONASS observables, L1 and L2, extended',
  1013: 'System parameters',
  1019: 'GPS ephemeris',
  1020: 'GLONASS ephemeris',
  1029: 'Text',
  1032: 'Physical reference station position',
  1033: 'Receiver and antenna descriptors',
  1042: 'BeiDou ephemeris',
  1044: 'QZSS ephemeris',
  1045: 'Galileo ephemeris, F/NAV',
  1046: 'Galileo ephemeris, I/NAV',
  1230: 'GLONASS code-phase biases',
};

/** MSM numbers are a base for each constellation plus a type from 1 to 7 (RTCM 10403.x). SBAS and QZSS from memory. */
const msmBases: Record<number, string> = {
  1070: 'GPS',
  1080: 'GLONASS',
  1090: 'Galileo',
  1100: 'SBAS',
  1110: 'QZSS',
  1120: 'BeiDou',
};

const msmOf = (number: number): { constellation: string; type: number } | null => {
  const constellation = msmBases[Math.floor(number / 10) * 10];
  const type = number % 10;
  return constellation !== undefined && type >= 1 && type <= 7 ? { constellation, type } : null;
};

export const isMsm = (number: number): boolean => msmOf(number) !== null;
/** Observations as they were before MSM. */
export const isLegacyObservation = (number: number): boolean =>
  (number >= 1001 && number <= 1004) || (number >= 1009 && number <= 1012);
export const isStationMessage = (number: number): boolean => number === 1005 || number === 1006;

export function messageName(number: number): string {
  const msm = msmOf(number);
  if (msm) return `${msm.constellation} observables, MSM${msm.type}`;
  return names[number] ?? (number >= 4001 && number <= 4095 ? 'Proprietary' : 'Other');
}

/** The constellation whose observations a message carries; null when it carries none. */
export function constellationOf(number: number): string | null {
  if (number >= 1001 && number <= 1004) return 'GPS';
  if (number >= 1009 && number <= 1012) return 'GLONASS';
  return msmOf(number)?.constellation ?? null;
}
