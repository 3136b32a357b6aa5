import { lossCase, simulatedCauses, CASE_SECONDS } from '@hubtack/simulators/scenarios/loss-case.js';
import { randomOf } from '@hubtack/simulators/scenarios/random.js';
import { epochAt } from '@hubtack/simulators/scenarios/simulated-epoch.js';
import type { Row } from './report.js';
import { SimulatedFirm, allDay } from './simulated-firm.js';

const CASES = 504;
/** Wanted of the first cause: over all, and for each cause (design: diagnosis.md; issue). */
const WANTED = 0.95;
const WANTED_OF_EACH = 0.85;
const START = Date.parse('2026-12-02T00:00:00Z');

/** Likely cause at raising against the truth of seeded losses, all at once through the whole application. */
export async function diagnosis(seed: number): Promise<Row[]> {
  const firm = await SimulatedFirm.start(START);
  const cases = Array.from({ length: CASES }, (_, index) =>
    lossCase(simulatedCauses[index % simulatedCauses.length]!, seed * 100_000 + index),
  );
  const units = cases.flatMap((one, index) => {
    const sourceId = firm.addSource(`M${index}`, one.base);
    return one.rovers.map((rover, at) => {
      const { roverId } = firm.addCrew(`${index}.${at}`, sourceId, allDay);
      return { roverId, rover, cause: one.cause, random: randomOf(seed * 7 + index * 10 + at) };
    });
  });
  firm.announce();
  for (let second = 0; second < CASE_SECONDS; second++) {
    const heard = units.flatMap(({ roverId, rover, random }) => {
      const epoch = epochAt(rover.behaviours, rover.site, START, second, random);
      return epoch ? [{ roverId, epoch }] : [];
    });
    await firm.pass(second, heard);
  }
  const found = firm.lostFixes();
  await firm.server.close();

  const table = new Map<string, Map<string, number>>();
  const ofCause = new Map<string, { right: number; all: number; atEnd: number }>();
  for (const { roverId, rover, cause } of units) {
    const { loss } = rover;
    if (!loss) continue;
    const row = found.find(
      (one) => one.roverId === roverId && Math.abs(one.startAt - START - loss.fromSecond * 1000) <= 2000,
    );
    const said = row?.diagnosisAtRaising?.cause ?? 'not raised';
    const line = table.get(cause) ?? new Map<string, number>();
    line.set(said, (line.get(said) ?? 0) + 1);
    table.set(cause, line);
    const sum = ofCause.get(cause) ?? { right: 0, all: 0, atEnd: 0 };
    sum.all++;
    if (said === cause) sum.right++;
    if (row?.diagnosis?.cause === cause) sum.atEnd++;
    ofCause.set(cause, sum);
  }
  printTable(table);
  const sums = [...ofCause.values()];
  const total = (of: 'right' | 'all' | 'atEnd') => sums.reduce((sum, one) => sum + one[of], 0);
  const rows: Row[] = [
    share('diagnosis/first cause', total('right'), total('all'), WANTED),
    share('diagnosis/at the end', total('atEnd'), total('all'), WANTED),
  ];
  for (const [cause, { right, all }] of ofCause)
    rows.push(share(`diagnosis/${cause}`, right, all, WANTED_OF_EACH));
  return rows;
}

const share = (name: string, right: number, all: number, wanted: number): Row => ({
  name,
  value: (100 * right) / all,
  unit: '%',
  floor: wanted * 100,
  ratio: right / all / wanted,
  n: all,
});

/** Rows: the truth; columns: what was said. On stderr, so that `--json` stays lines of JSON. */
function printTable(table: ReadonlyMap<string, ReadonlyMap<string, number>>): void {
  const said = [...new Set([...table.values()].flatMap((line) => [...line.keys()]))].toSorted();
  const lines = [
    ['truth \\ said', ...said],
    ...[...table].map(([cause, line]) => [cause, ...said.map((one) => String(line.get(one) ?? 0))]),
  ];
  for (const line of lines)
    console.error(line.map((cell, index) => (index === 0 ? cell.padEnd(20) : cell.padStart(20))).join(''));
}
