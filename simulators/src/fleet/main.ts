import { existsSync, writeFileSync } from 'node:fs';
import { z } from 'zod';
import { readOptions, stopWith } from '../cli/options.js';
import { scenarioNames, scenarios } from '../scenarios/scenarios.js';
import { runFleet } from './fleet.js';
import { keysFromFile, makeRovers, type FleetRover } from './rover-keys.js';
import { HttpLink, TcpLink } from './rover-link.js';

const usage = `Simulated crews that send real sentences to a running server.

  npm run fleet -- [--crews N] [--scenario NAME] [--seed N] [--speed X] [--via http|tcp] [--duration S]
                   [--url http://127.0.0.1:3000] [--tcp 127.0.0.1:10110]
                   [--keys FILE | --email ADDRESS --password WORDS] [--truth FILE]

Scenarios: ${scenarioNames.join(', ')}
--truth writes what is true of each rover beside the sentences: losses by cause, and what a chief would mark, in
simulated seconds since the start. A day lasts ten hours. At another speed sentences carry the real time, so that
for the server a loss lasts as many times shorter: the whole of a day at speed is what the benches are for.
Keys come from --keys (with --crews, the first N of it); without, from a running demo's own file when no --crews is
given; else crews, rovers and keys are made by signing in as a technician or manager.`;

const DEMO_KEYS = 'var/demo/demo-rover-keys.json';

const options = readOptions(
  usage,
  {
    crews: { type: 'string' },
    scenario: { type: 'string' },
    seed: { type: 'string' },
    speed: { type: 'string' },
    via: { type: 'string' },
    duration: { type: 'string' },
    url: { type: 'string' },
    tcp: { type: 'string' },
    keys: { type: 'string' },
    email: { type: 'string' },
    password: { type: 'string' },
    truth: { type: 'string' },
  },
  z.object({
    crews: z.coerce.number().int().min(1).max(2000).optional(),
    scenario: z.enum(scenarioNames).default('demo'),
    seed: z.coerce.number().int().min(0).default(1),
    speed: z.coerce.number().positive().max(100).default(1),
    via: z.enum(['http', 'tcp']).default('http'),
    duration: z.coerce.number().positive().optional(),
    url: z.url().default('http://127.0.0.1:3000'),
    tcp: z
      .string()
      .regex(/^[^:]+:\d+$/, 'write HOST:PORT')
      .default('127.0.0.1:10110'),
    keys: z.string().optional(),
    email: z.string().default('manager@pennywort.example'),
    password: z.string().default('tack-in-the-hub'),
    truth: z.string().optional(),
  }),
);

const { url, email, password } = options;
const keysFile =
  options.keys ?? (options.crews === undefined && existsSync(DEMO_KEYS) ? DEMO_KEYS : undefined);
const stopping = new AbortController();
for (const signal of ['SIGINT', 'SIGTERM'] as const) process.once(signal, () => stopping.abort());

async function roversToRun(): Promise<FleetRover[]> {
  if (keysFile === undefined) return makeRovers({ url, email, password }, options.crews ?? 6);
  const rovers = keysFromFile(keysFile);
  if (options.crews !== undefined && options.crews > rovers.length)
    stopWith(`--crews: there are ${rovers.length} keys in ${keysFile}`, usage);
  return rovers.slice(0, options.crews);
}

let lastProblem = 0;
const onProblem = (label: string, error: Error) => {
  // One line a second is enough to see that the server is away.
  if (Date.now() - lastProblem < 1000) return;
  lastProblem = Date.now();
  console.error(`${label}: ${error.message}`);
};

try {
  const rovers = await roversToRun();
  const [host, port] = options.tcp.split(':') as [string, string];
  console.log(
    `${rovers.length} rovers, scenario ${options.scenario}, seed ${options.seed}, over ${options.via}`,
  );
  const story = scenarios[options.scenario](options.seed);
  if (options.truth !== undefined) {
    const crews = rovers.map(({ label }, index) => {
      const { losses, marks } = story(index);
      return { label, losses, marks };
    });
    const truth = {
      scenario: options.scenario,
      seed: options.seed,
      startsAt: new Date().toISOString(),
      crews,
    };
    writeFileSync(options.truth, `${JSON.stringify(truth, null, 2)}\n`);
  }
  await runFleet({
    rovers,
    story,
    seed: options.seed,
    speed: options.speed,
    durationSeconds: options.duration ?? null,
    link: ({ key }) =>
      options.via === 'http' ? new HttpLink(url, key) : new TcpLink(host, Number(port), key),
    signal: stopping.signal,
    onProblem,
  });
} catch (error) {
  const { message, cause } = error as Error;
  console.error(cause instanceof Error ? `${message} (${cause.message})` : message);
  process.exitCode = 1;
}
