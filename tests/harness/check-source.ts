import {
  runCheck,
  type CheckTarget,
  type CheckTimeLimits,
} from '@hubtack/backend/corrections/check/run-check.js';
import { failedStepOf } from '@hubtack/backend/corrections/check/report.js';
import type { CheckReport, CheckStep, CheckStepName } from '@hubtack/contracts/corrections/check.js';
import type { Lookup } from '@hubtack/backend/corrections/ntrip/addresses.js';

/** Where the checks of the tests are made for: 12 km from the base of `testBase`. */
export const testPlace = { latitude: -41.44, longitude: 147.14 };
export const testBase = { latitude: -41.5, longitude: 147.25, heightM: 120.25, stationId: 7 };
export const testLogin = { user: 'pennywort', password: 'field-book' };

/** Quick, because the simulator's seconds are short too. */
export const quick: Partial<CheckTimeLimits> = {
  addressMs: 1000,
  connectMs: 1000,
  firstReplyMs: 1500,
  tableMs: 3000,
  idleMs: 300,
  firstByteMs: 600,
  lookMs: 400,
  longLookMs: 700,
  stallMs: 250,
};

export interface Checked {
  report: CheckReport;
  failed: CheckStepName | null;
  step: (name: CheckStepName) => CheckStep;
}

/** Names of the tests that need no network. */
export const lookup: Lookup = (name) =>
  name === 'caster.pennywort.example'
    ? Promise.resolve([{ address: '127.0.0.1', family: 4 }])
    : Promise.reject(Object.assign(new Error(`no ${name}`), { code: 'ENOTFOUND' }));

export async function checkSource(
  change: Partial<CheckTarget> & Pick<CheckTarget, 'port'>,
  onReport: (report: CheckReport) => void = () => undefined,
  signal = new AbortController().signal,
): Promise<Checked> {
  const target: CheckTarget = {
    address: 'caster.pennywort.example',
    mountPoint: 'TANF00',
    user: testLogin.user,
    password: testLogin.password,
    ntripVersion: 2,
    tls: false,
    sendPosition: false,
    expectedFormat: 'any',
    place: testPlace,
    before: null,
    allowPrivate: true,
    ...change,
  };
  const report = await runCheck(target, { signal, onReport, limits: quick, lookup });
  const step = (name: CheckStepName) => report.steps.find((one) => one.step === name)!;
  return { report, failed: failedStepOf(report), step };
}
