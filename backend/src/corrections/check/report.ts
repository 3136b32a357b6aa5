import {
  checkStepNames,
  type CheckReport,
  type CheckStep,
  type CheckStepName,
} from '@hubtack/contracts/corrections/check.js';

/** A report in which nothing has run. */
export const blankReport = (): CheckReport => ({
  steps: checkStepNames.map((step) => ({
    step,
    outcome: 'waiting',
    seen: '',
    toTry: null,
    warnings: [],
    durationMs: null,
  })),
  spellings: [],
  nearest: [],
  stream: null,
  base: null,
});

export const failedStepOf = (report: CheckReport): CheckStepName | null =>
  report.steps.find(({ outcome }) => outcome === 'fail')?.step ?? null;

/** The caster has refused the login: nobody tries the same one again by itself. */
export const isLoginRefused = (report: CheckReport): boolean => failedStepOf(report) === 'login';

/** The report of a running check; tells of every change. */
export class Progress {
  private report = blankReport();
  private readonly begun = new Map<CheckStepName, number>();

  constructor(
    private readonly now: () => number,
    private readonly onReport: (report: CheckReport) => void,
  ) {}

  get current(): CheckReport {
    return this.report;
  }

  begin(step: CheckStepName): void {
    this.begun.set(step, this.now());
    this.change(step, { outcome: 'running' });
  }

  /** What has been seen so far of a step that runs. */
  see(step: CheckStepName, seen: string): void {
    this.change(step, { seen });
  }

  pass(step: CheckStepName, seen: string, warnings: string[] = []): void {
    this.end(step, { outcome: 'pass', seen, warnings });
  }

  fail(step: CheckStepName, seen: string, toTry: string, warnings: string[] = []): void {
    this.end(step, { outcome: 'fail', seen, toTry, warnings });
  }

  skip(step: CheckStepName, seen: string): void {
    this.end(step, { outcome: 'skipped', seen });
  }

  /** What has not run is skipped. */
  skipRest(why: string): void {
    const rest = this.report.steps.filter(({ outcome }) => outcome === 'waiting' || outcome === 'running');
    for (const { step } of rest) this.change(step, { outcome: 'skipped', seen: why });
  }

  add(parts: Partial<Omit<CheckReport, 'steps'>>): void {
    this.report = { ...this.report, ...parts };
    this.onReport(this.report);
  }

  private end(step: CheckStepName, change: Partial<CheckStep>): void {
    const begun = this.begun.get(step);
    this.change(step, { ...change, durationMs: begun === undefined ? null : this.now() - begun });
  }

  private change(step: CheckStepName, change: Partial<CheckStep>): void {
    const steps = this.report.steps.map((one) => (one.step === step ? { ...one, ...change } : one));
    this.report = { ...this.report, steps };
    this.onReport(this.report);
  }
}
