import { writeGga, writeGst, writeRmc } from '@hubtack/contracts/nmea/sentence-writer.js';
import { uniformInt } from 'pure-rand/distribution/uniformInt';
import type { RandomGenerator } from 'pure-rand/types/RandomGenerator';
import type { Behaviour } from '../scenarios/behaviour.js';
import { chance, randomOf } from '../scenarios/random.js';
import { stateAt } from '../scenarios/simulated-epoch.js';

const METRES_A_DEGREE = 111_320;
/** A crew walks from point to point: metres a second, and how far from the middle of its site. */
const WALK_M = 0.7;
const SITE_RADIUS_M = 120;
/** Scatter of a position by quality, metres. */
const scatterM: Record<number, number> = { 4: 0.008, 5: 0.35, 2: 0.9, 1: 2.5 };

/** A rover on its site, a second at a time. The same seed gives the same sentences. */
export class SimulatedRover {
  private readonly random: RandomGenerator;
  private east = 0;
  private north = 0;
  private heading: number;

  constructor(
    private readonly site: { latitude: number; longitude: number },
    private readonly behaviours: readonly Behaviour[],
    seed: number,
    private readonly stands = false,
  ) {
    this.random = randomOf(seed);
    this.heading = uniformInt(this.random, 0, 359);
  }

  /** Sentences of the instant `time` (ms UTC), `seconds` after the start; empty when it sends nothing. */
  sentencesAt(time: number, seconds: number): string {
    const state = stateAt(this.behaviours, seconds, this.random);
    if (!this.stands) this.walk();
    if (state.quiet) return '';
    const noise = scatterM[state.quality] ?? 0;
    const offset = () => (chance(this.random) + chance(this.random) - 1) * noise;
    const latitude = this.site.latitude + (this.north + offset()) / METRES_A_DEGREE;
    const shrink = Math.cos((this.site.latitude * Math.PI) / 180);
    const longitude = this.site.longitude + (this.east + offset()) / (METRES_A_DEGREE * shrink);
    const gga = writeGga({
      time,
      latitude,
      longitude,
      quality: state.quality,
      satellites: state.satellites,
      hdop: state.hdop,
      altitudeM: 42 + offset(),
      geoidSeparationM: -3.1,
      ageSeconds: state.ageSeconds,
      stationId: state.stationId,
    });
    const gst = writeGst({
      time,
      sigmaM: Math.max(noise, 0.006),
      sigmaAltitudeM: Math.max(noise * 1.7, 0.011),
    });
    return gga + gst + writeRmc({ time, latitude, longitude });
  }

  private walk(): void {
    if (chance(this.random) < 0.05) this.heading = uniformInt(this.random, 0, 359);
    const radians = (this.heading * Math.PI) / 180;
    this.east += Math.sin(radians) * WALK_M;
    this.north += Math.cos(radians) * WALK_M;
    if (Math.hypot(this.east, this.north) > SITE_RADIUS_M) this.heading = (this.heading + 180) % 360;
  }
}
