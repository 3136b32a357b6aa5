import { CommitQueue } from '@hubtack/backend/fixes/commit.queue.js';
import type { Epoch } from '@hubtack/backend/fixes/epoch.js';
import { LostFixWatch } from '@hubtack/backend/lost-fixes/lost-fix.watch.js';
import { Changes } from '@hubtack/backend/common/changes.js';
import type { ShiftPatternDay } from '@hubtack/contracts/crews/crew.js';
import { correctionSources } from '@hubtack/drizzle/schema/correction-sources.js';
import { crews } from '@hubtack/drizzle/schema/crews.js';
import { lostFixes } from '@hubtack/drizzle/schema/lost-fixes.js';
import { roverAssignments, rovers } from '@hubtack/drizzle/schema/rovers.js';
import type { SimulatedEpoch } from '@hubtack/simulators/scenarios/simulated-epoch.js';
import { startServer, type TestServer } from '../harness/server.js';

interface Place {
  latitude: number;
  longitude: number;
}

export const allDay: ShiftPatternDay[] = [1, 2, 3, 4, 5, 6, 7].map((weekday) => ({
  weekday,
  start: '00:00',
  end: '00:00',
}));

/** The whole application with a clock that the bench moves: a day passes in minutes, and every second of it is looked at. */
export class SimulatedFirm {
  private constructor(
    readonly server: TestServer,
    readonly startAt: number,
  ) {}

  static async start(startAt: number): Promise<SimulatedFirm> {
    const server = await startServer({ RAW_EPOCH_DAYS: '30' });
    server.clock.set(startAt);
    // How fast a disk is has no part in what is measured here.
    server.database.$client.pragma('synchronous = OFF');
    return new SimulatedFirm(server, startAt);
  }

  addSource(mountPoint: string, base: Place): number {
    return this.server.database
      .insert(correctionSources)
      .values({
        name: mountPoint,
        address: 'localhost',
        port: 2101,
        mountPoint,
        baseLatitude: base.latitude,
        baseLongitude: base.longitude,
      })
      .returning()
      .get().id;
  }

  /** A crew with one rover, on shift all day or by a pattern; with an empty one its marks say. */
  addCrew(name: string, sourceId: number, pattern: ShiftPatternDay[]): { crewId: number; roverId: number } {
    const { database } = this.server;
    const crewId = database.insert(crews).values({ name, pattern }).returning().get().id;
    const roverId = database
      .insert(rovers)
      .values({ label: `R ${name}`, correctionSourceId: sourceId })
      .returning()
      .get().id;
    database.insert(roverAssignments).values({ roverId, crewId, startAt: this.startAt }).run();
    return { crewId, roverId };
  }

  announce(): void {
    this.server.app.get(Changes).announce({ kind: 'firm' });
  }

  /** Moves the clock to a second, stores what came in, and looks. */
  async pass(second: number, heard: readonly { roverId: number; epoch: SimulatedEpoch }[]): Promise<void> {
    this.server.clock.set(this.startAt + second * 1000);
    const queue = this.server.app.get(CommitQueue);
    await Promise.all(heard.map(({ roverId, epoch }) => queue.add(roverId, [whole(epoch)])));
    this.server.app.get(LostFixWatch).sweep();
  }

  lostFixes(): (typeof lostFixes.$inferSelect)[] {
    return this.server.database.select().from(lostFixes).all();
  }
}

const whole = (epoch: SimulatedEpoch): Epoch => ({
  ...epoch,
  altitudeM: 40,
  geoidSeparationM: -3,
  sigmaLatitudeM: null,
  sigmaLongitudeM: null,
  sigmaAltitudeM: null,
});
