import { ecefOf } from '@hubtack/contracts/geodesy/ecef.js';
import { writeBits } from '@hubtack/contracts/rtcm/bits.js';
import { RtcmFrameReader } from '@hubtack/contracts/rtcm/frame-reader.js';
import { frameOf } from '@hubtack/contracts/rtcm/frame-writer.js';
import { isStationMessage } from '@hubtack/contracts/rtcm/messages.js';
import { writeStation } from '@hubtack/contracts/rtcm/station.js';
import { between, randomOf } from '../scenarios/random.js';
import type { MountPointOptions } from './mount-point.js';

export interface Frame {
  bytes: Uint8Array;
  isStation: boolean;
}
/** The frames of each second in turn, without end. `place`: where a virtual base is wanted. */
export type FrameSource = (second: number, place: { latitude: number; longitude: number } | null) => Frame[];

/** Message number and bytes of the payload: about what a base with thirty satellites sends. */
const MSM: readonly [number, number][] = [
  [1077, 230],
  [1087, 180],
  [1097, 200],
  [1127, 220],
  [1230, 8],
];
const LEGACY: readonly [number, number][] = [
  [1004, 140],
  [1012, 110],
];
const METRES_OF_A_DEGREE = 111_132;

export function framesOf(options: MountPointOptions, seed: number): FrameSource {
  const { stream } = options;
  if (stream.kind === 'recording') return recorded(stream.bytes);
  const observations = stream.kind === 'msm' ? MSM : LEGACY;
  const random = randomOf(seed);
  const stationId = options.stationId ?? 1;
  return (second, place) => {
    const { faults = {} } = options;
    const every = options.stationEverySeconds ?? 1;
    const frames: Frame[] = observations.map(([number, size]) => {
      const payload = Uint8Array.from({ length: size }, () => between(random, 0, 255));
      writeBits(payload, 0, 12, number);
      writeBits(payload, 12, 12, faults.stationId ?? stationId);
      return { bytes: frameOf(payload), isStation: false };
    });
    if (second % every !== 0) return frames;
    const latitude = (place?.latitude ?? options.latitude) + (faults.movedNorthM ?? 0) / METRES_OF_A_DEGREE;
    const longitude = place?.longitude ?? options.longitude;
    const payload = writeStation({
      stationId: faults.stationId ?? stationId,
      isVirtual: options.isNetwork === true,
      ...ecefOf({ latitude, longitude, heightM: options.heightM ?? 100 }),
      antennaHeightM: options.antennaHeightM ?? null,
    });
    return [{ bytes: frameOf(payload), isStation: true }, ...frames];
  };
}

/** Six frames a second, as the recording has them. */
function recorded(bytes: Uint8Array): FrameSource {
  const frames: Frame[] = [];
  const reader = new RtcmFrameReader({
    frame: (payload, number) => frames.push({ bytes: frameOf(payload), isStation: isStationMessage(number) }),
  });
  reader.push(bytes);
  reader.end();
  const perSecond = 6;
  return (second) =>
    Array.from({ length: perSecond }, (_, index) => frames[(second * perSecond + index) % frames.length]!);
}
