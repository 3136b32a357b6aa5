import { causeLabels, firstThings } from '@hubtack/contracts/lost-fixes/cause.js';
import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';

/** Likely cause with all its evidence, what was thought at first, and the first thing to try. */
export function DiagnosisPart({ lostFix: { diagnosis, diagnosisAtRaising, closed } }: { lostFix: LostFix }) {
  if (!diagnosis) return null;
  const { cause, evidence, runnerUp } = diagnosis;
  const hasChanged = diagnosisAtRaising && diagnosisAtRaising.cause !== cause;
  return (
    <section aria-label="Likely cause">
      <h2>{causeLabels[cause]}?</h2>
      <ul className="evidence-list">
        {evidence.map((line) => (
          <li key={line}>{line}</li>
        ))}
      </ul>
      {runnerUp && <p>Or: {causeLabels[runnerUp].toLowerCase()}.</p>}
      {hasChanged && (
        <p>
          When it was raised: {causeLabels[diagnosisAtRaising.cause].toLowerCase()} (
          {diagnosisAtRaising.evidence.join(', ')}).
        </p>
      )}
      {!closed && (
        <p>
          <strong>First thing to try.</strong> {firstThings[cause]}
        </p>
      )}
    </section>
  );
}
