import type { Lane } from '@hubtack/contracts/board/lane.js';
import { fixStateWords } from '@hubtack/contracts/fixes/fix-state.js';
import { useEffect, useRef, useState } from 'react';
import { stateNow } from '../../live/lane-figures';

/** Announcements come at most this often, and several changes in one. */
const EVERY_MS = 5000;

/** Tells changes of state to people who do not see them: politely, together, one region for the page. */
export function Announcer({ lanes, now }: { lanes: readonly Lane[]; now: number }) {
  const known = useRef<Map<number, string> | null>(null);
  const lastAt = useRef(0);
  const [words, setWords] = useState('');
  useEffect(() => {
    if (known.current && now - lastAt.current < EVERY_MS) return;
    const current = new Map(lanes.map((lane) => [lane.id, stateNow(lane, now).state] as const));
    const changed = lanes.filter(
      (lane) => known.current?.has(lane.id) && known.current.get(lane.id) !== current.get(lane.id),
    );
    known.current = current;
    lastAt.current = now;
    if (changed.length === 0) return;
    const named = changed
      .slice(0, 4)
      .map((lane) => `${lane.crewName ?? lane.roverLabel}: ${fixStateWords[current.get(lane.id)!]}`);
    const more = changed.length > named.length ? `, and ${changed.length - named.length} more` : '';
    setWords(named.join(', ') + more);
  }, [lanes, now]);
  return (
    <p className="visually-hidden" aria-live="polite">
      {words}
    </p>
  );
}
