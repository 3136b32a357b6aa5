import type { LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { useMemo } from 'react';
import { clockTime } from '../../lib/format';

/** What the office answered today, newest first. */
export function AdviceList({ lostFixes, zone }: { lostFixes: readonly LostFix[]; zone: string }) {
  const answers = useMemo(
    () =>
      lostFixes
        .flatMap(({ id, advice }) => (advice ? [{ id, ...advice }] : []))
        .toSorted((a, b) => b.at - a.at),
    [lostFixes],
  );
  return (
    <div className="advice-list" aria-live="polite" aria-label="Advice from the office" role="region">
      {answers.map(({ id, at, by, text }) => (
        <blockquote key={id}>
          <p className="advice-by">
            {by}, {clockTime(at, zone)}
          </p>
          <p>{text}</p>
        </blockquote>
      ))}
    </div>
  );
}
