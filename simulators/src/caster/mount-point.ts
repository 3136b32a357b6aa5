/** What a mount point sends. */
export type StreamKind =
  /** Frames with right CRC as made by a base at a position: MSM observations. */
  | { kind: 'msm' }
  /** The same with the observation messages from before MSM. */
  | { kind: 'legacy' }
  /** Frames of a recording, over and over. */
  | { kind: 'recording'; bytes: Uint8Array };

/** Faults on demand; they can be combined. Absent: well. */
export interface StreamFaults {
  /** Says that the stream begins, and sends nothing. */
  silent?: boolean;
  /** Says nothing at all to the request. */
  mute?: boolean;
  /** Sends nothing before it has had a GGA, as a network does. */
  waitsForPosition?: boolean;
  /** Sends so many frames and then nothing more. */
  stallAfterFrames?: number;
  /** The same in bytes: most often in the middle of a frame. */
  stallAfterBytes?: number;
  /** Cuts the connection in the middle of the frame after so many. */
  cutAfterFrames?: number;
  /** So many random bytes between the frames. */
  garbageBytes?: number;
  /** Every n-th frame has a wrong CRC. */
  badCrcEvery?: number;
  /** Only garbage, no frame. */
  onlyGarbage?: boolean;
  /** Sends no station message. */
  noStation?: boolean;
  /** The base is said to be so many metres farther north (roughly). */
  movedNorthM?: number;
  /** Another station id than the mount point's. */
  stationId?: number;
  /** Not served just now: the answer is the table. */
  withdrawn?: boolean;
  /** Answers with this HTTP status whatever the login. */
  status?: number;
}

export interface MountPointOptions {
  name: string;
  stream: StreamKind;
  latitude: number;
  longitude: number;
  heightM?: number;
  stationId?: number;
  /** Message 1006 instead of 1005. */
  antennaHeightM?: number;
  login?: { user: string; password: string };
  /** A network that computes a virtual base: sends once it has had a GGA, from a base near that place. */
  isNetwork?: boolean;
  identifier?: string;
  /** ISO 3166, three letters. */
  country?: string;
  /** Seconds between two station messages; 1 when not said. */
  stationEverySeconds?: number;
  faults?: StreamFaults;
}
