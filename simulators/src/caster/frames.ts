import { ecefOf } from '@hubtack/contracts/geodesy/ecef.js';
import { RtcmFrameReader } from '@hubtack/contracts/rtcm/frame-reader.js';
import { frameOf } from '@hubtack/contracts/rtcm/frame-writer.js';
import { isStationMessage } from '@hubtack/contracts/rtcm/messages.js';
import { writeStation } from '@hubtack/contracts/rtcm/station.js';
import { randomOf } from '../scenarios/random.js';
import type { MountPointOptions } from './mount-point.js';
import { biasPayload, legacyPayload, msmPayload } from './observations.js';

export interface Frame {
  bytes: Uint8Array;
  isStation: boolean;
}
/** The frames of each second in turn, without end. `place`: where a virtual base is wanted. */
export type FrameSource = (second: number, place: { latitude: number; longitude: number } | null) => Frame[];

const MSM = [
  { number: 1077, satellites: [2, 5, 7, 13, 15, 20, 29, 30] },
  { number: 1087, satellites: [1, 8, 9, 14, 15, 23] },
  { number: 1097, satellites: [3, 8, 13, 15, 21, 26, 31] },
  { number: 1127, satellites: [6, 9, 16, 21, 22, 36, 39, 45] },
] as const;
const LEGACY = [
  { number: 1004, satellites: [2, 5, 7, 13, 15, 20, 29, 30] },
  { number: 1012, satellites: [1, 8, 9, 14, 15, 23] },
] as const;
const METRES_OF_A_DEGREE = 111_132;

/** `startAt`: the instant of second 0, ms UTC. */
export function framesOf(options: MountPointOptions, seed: number, startAt: number): FrameSource {
  const { stream } = options;
  if (stream.kind === 'recording') return recorded(stream.bytes);
  const [observations, write] = stream.kind === 'msm' ? [MSM, msmPayload] : [LEGACY, legacyPayload];
  const random = randomOf(seed);
  return (second, place) => {
    const stationId = options.faults?.stationId ?? options.stationId ?? 1;
    const at = startAt + second * 1000;
    const payloads = observations.map((one, index) =>
      write({ ...one, stationId, at }, index === observations.length - 1, random),
    );
    if (stream.kind === 'msm') payloads.push(biasPayload(stationId, random));
    const frames = payloads.map((payload) => ({ bytes: frameOf(payload), isStation: false }));
    if (second % (options.stationEverySeconds ?? 1) !== 0) return frames;
    return [{ bytes: frameOf(stationPayload(options, stationId, place)), isStation: true }, ...frames];
  };
}

function stationPayload(
  options: MountPointOptions,
  stationId: number,
  place: { latitude: number; longitude: number } | null,
): Uint8Array {
  const { latitude, longitude } = place ?? options;
  const movedBy = (options.faults?.movedNorthM ?? 0) / METRES_OF_A_DEGREE;
  return writeStation({
    stationId,
    isVirtual: options.isNetwork === true,
    ...ecefOf({ latitude: latitude + movedBy, longitude, heightM: options.heightM ?? 100 }),
    antennaHeightM: options.antennaHeightM ?? null,
  });
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
