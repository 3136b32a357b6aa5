import type { HistoryEntry } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { clockTimeSeconds, utc } from '../../lib/format';

const words: Record<HistoryEntry['kind'], string> = {
  raised: 'Raised',
  flagged: 'Flagged',
  taken: 'Taken',
  handedOver: 'Handed over',
  advice: 'Advice',
  photo: 'Photo',
  shelved: 'Shelved',
  backFromShelf: 'Back',
  corrected: 'Corrected',
  ended: 'Ended',
  opened: 'Open again',
  withdrawn: 'Withdrawn',
  closed: 'Closed',
};

/** What happened, in order, and who did it. */
export function HistoryList({ history, zone }: { history: readonly HistoryEntry[]; zone: string }) {
  return (
    <section aria-label="History">
      <h2>History</h2>
      <ol className="history">
        {history.map(({ id, at, by, kind, text }) => (
          <li key={id}>
            <time title={utc(at)}>{clockTimeSeconds(at, zone)}</time>
            <span>
              <strong>{words[kind]}</strong> {text !== words[kind] && text} {by && <small>{by}</small>}
            </span>
          </li>
        ))}
      </ol>
    </section>
  );
}
