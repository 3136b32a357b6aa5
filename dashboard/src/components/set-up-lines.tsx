import type { Lane } from '@hubtack/contracts/board/lane.js';
import { clockTime, utc } from '../lib/format';
import { checkWords } from '../lib/set-up-words';
import './set-up-lines.css';

/** What is known of a rover's set-up today: the card, and the newest check into control. */
export function SetUpLines({ lane, zone }: { lane: Pick<Lane, 'setUp' | 'checkShot'>; zone: string }) {
  const check = checkWords(lane.checkShot, zone);
  return (
    <div className="set-up-lines">
      <p data-missing={!lane.setUp}>
        {lane.setUp ? (
          <span title={utc(lane.setUp.at)}>
            Set up {clockTime(lane.setUp.at, zone)}, pole {lane.setUp.poleHeightM.toFixed(3)} m, by{' '}
            {lane.setUp.by}
          </span>
        ) : (
          'No set-up card today'
        )}
      </p>
      <p data-missing={!check?.counts}>{check ? check.long : 'Not checked into control yet'}</p>
    </div>
  );
}
