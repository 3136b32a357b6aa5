import { signedAt, unsignedAt, writeBits } from './bits.js';

/** Antenna reference point of a base, from message 1005 or 1006. ECEF metres to 0.1 mm. */
export interface Station {
  stationId: number;
  /** DF141: computed, not a station that stands there. */
  isVirtual: boolean;
  x: number;
  y: number;
  z: number;
  /** Message 1006 only. */
  antennaHeightM: number | null;
}

const UNITS_IN_M = 10_000;
const metres = (units: number): number => units / UNITS_IN_M;
const units = (m: number): number => Math.round(m * UNITS_IN_M);

const BYTES = { 1005: 19, 1006: 21 } as const;
/** First bit of each field; widths after RTCM 10403.x, messages 1005 and 1006. */
const AT = { stationId: 12, isVirtual: 33, x: 34, y: 74, z: 114, antennaHeight: 152 } as const;
const COORDINATE_BITS = 38;

/** Reads a payload of message 1005 or 1006; null for any other, or one that is too short. */
export function readStation(payload: Uint8Array): Station | null {
  if (payload.length < 2) return null;
  const number = unsignedAt(payload, 0, 12);
  if (number !== 1005 && number !== 1006) return null;
  if (payload.length < BYTES[number]) return null;
  return {
    stationId: unsignedAt(payload, AT.stationId, 12),
    isVirtual: unsignedAt(payload, AT.isVirtual, 1) === 1,
    x: metres(signedAt(payload, AT.x, COORDINATE_BITS)),
    y: metres(signedAt(payload, AT.y, COORDINATE_BITS)),
    z: metres(signedAt(payload, AT.z, COORDINATE_BITS)),
    antennaHeightM: number === 1006 ? metres(unsignedAt(payload, AT.antennaHeight, 16)) : null,
  };
}

/** The payload of message 1005, or 1006 when there is an antenna height. GPS, GLONASS and Galileo are said to be served. */
export function writeStation(station: Station): Uint8Array {
  const number = station.antennaHeightM === null ? 1005 : 1006;
  const payload = new Uint8Array(BYTES[number]);
  writeBits(payload, 0, 12, number);
  writeBits(payload, AT.stationId, 12, station.stationId);
  writeBits(payload, 30, 3, 0b111);
  writeBits(payload, AT.isVirtual, 1, station.isVirtual ? 1 : 0);
  writeBits(payload, AT.x, COORDINATE_BITS, units(station.x));
  writeBits(payload, AT.y, COORDINATE_BITS, units(station.y));
  writeBits(payload, AT.z, COORDINATE_BITS, units(station.z));
  if (station.antennaHeightM !== null)
    writeBits(payload, AT.antennaHeight, 16, units(station.antennaHeightM));
  return payload;
}
