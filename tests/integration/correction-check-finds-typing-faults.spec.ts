import { startCaster, type Caster } from '@hubtack/simulators/caster/caster.js';
import type { MountPointOptions } from '@hubtack/simulators/caster/mount-point.js';
import { between, randomOf } from '@hubtack/simulators/scenarios/random.js';
import type { CheckStepName } from '@hubtack/contracts/corrections/check.js';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { checkSource, testBase, testLogin } from '../harness/check-source.js';

/** What fingers and eyes do to a login (common practice, no source). */
const slips = ['transposed', 'dropped', 'doubled', 'lookAlike'] as const;
type Slip = (typeof slips)[number];
const LOOKS: Record<string, string> = {
  O: '0',
  '0': 'O',
  l: '1',
  '1': 'l',
  I: 'l',
  S: '5',
  '5': 'S',
  B: '8',
  '8': 'B',
  o: '0',
  i: 'l',
  '2': 'Z',
  Z: '2',
};

function slipAt(text: string, at: number, slip: Slip): string {
  const before = text.slice(0, at);
  const here = text[at]!;
  const next = text[at + 1] ?? '';
  switch (slip) {
    case 'transposed':
      return before + next + here + text.slice(at + 2);
    case 'dropped':
      return before + text.slice(at + 1);
    case 'doubled':
      return before + here + here + text.slice(at + 1);
    case 'lookAlike':
      return before + (LOOKS[here] ?? here) + text.slice(at + 1);
  }
}

const random = randomOf(20_261_201);
/** The text with one slip that changes it and is not one of `others`; where the slip changes nothing anywhere, another slip. */
function mistyped(text: string, slip: Slip, others: readonly string[] = []): string {
  for (let tries = 0; ; tries++) {
    const kind = tries > 200 ? slips[tries % slips.length]! : slip;
    const wrong = slipAt(text, between(random, 0, text.length - 1), kind);
    if (wrong !== text && wrong !== '' && !others.includes(wrong)) return wrong;
  }
}

const names = ['TANF00', 'TANF01', 'MILR00', 'QUARB2', 'SALT00', 'SALT01', 'TASNET', 'HOPK10', 'GASW02'];
const mountPoints: MountPointOptions[] = names.map((name) => ({
  name,
  stream: { kind: 'msm' },
  ...testBase,
  login: testLogin,
}));
const ADDRESS = 'caster.pennywort.example';

interface Case {
  field: 'address' | 'port' | 'mountPoint' | 'user' | 'password';
  slip: Slip;
  right: string;
  step: CheckStepName;
}
const fields: [Case['field'], (index: number) => string, CheckStepName][] = [
  ['address', () => ADDRESS, 'address'],
  // The caster's own port takes its place below: it is given by the system.
  ['port', () => '', 'connection'],
  ['mountPoint', (index) => names[index % names.length]!, 'mountPoint'],
  ['user', () => testLogin.user, 'login'],
  ['password', () => testLogin.password, 'login'],
];
/** Forty: each field, each slip, twice. */
const cases: Case[] = fields.flatMap(([field, right, step], row) =>
  slips.flatMap((slip, column) =>
    [0, 1].map((round) => ({ field, slip, right: right(row + column * 2 + round), step })),
  ),
);

let caster: Caster;
beforeAll(async () => {
  caster = await startCaster({ mountPoints, secondMs: 40 });
});
afterAll(() => caster.close());

it('there are forty', () => {
  expect(cases).toHaveLength(40);
});

it.each(cases)('a $field with a character $slip fails at its step', async ({ field, slip, right, step }) => {
  if (field === 'port') {
    const port = Number(mistyped(String(caster.port), slip));
    const isPort = Number.isInteger(port) && port >= 1 && port <= 65_535;
    // A letter, or a number too large, does not get past the form: contracts/src/corrections/correction-source.ts.
    const wrong = isPort ? port : Number(mistyped(String(caster.port), 'dropped'));
    expect((await checkSource({ port: wrong })).failed).toBe(step);
    return;
  }
  const wrong = mistyped(right, slip, field === 'mountPoint' ? names : []);
  const { failed, report } = await checkSource({ port: caster.port, [field]: wrong });
  expect(failed, `${field} ${wrong}`).toBe(step);
  if (field === 'mountPoint')
    expect(
      report.spellings.slice(0, 3).map(({ mountPoint }) => mountPoint),
      wrong,
    ).toContain(right);
});
