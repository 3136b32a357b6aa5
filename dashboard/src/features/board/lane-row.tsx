import { wholeOf } from '@hubtack/contracts/fixes/totals.js';
import type { Lane } from '@hubtack/contracts/board/lane.js';
import { fixStateWords } from '@hubtack/contracts/fixes/fix-state.js';
import { memo } from 'react';
import { SpanRibbon } from '../../components/span-ribbon';
import { StateGlyph } from '../../components/state-glyph';
import { stateNow, totalsNow } from '../../live/lane-figures';
import { useLane, useLostFixOf, useServerNow } from '../../live/use-lanes';
import { age, clockTime, distance, duration, utc } from '../../lib/format';
import { checkWords } from '../../lib/set-up-words';
import { percent } from '../../lib/percent';
import { useMe } from '../../lib/session';
import { LostFixNote } from './lost-fix-note';
import { CALL_AFTER_MS, needOf } from './need';

const HOUR_MS = 3_600_000;
/** Corrections older than this no longer keep the tolerance, even while the receiver still says fixed. */
const OLD_AGE_MS = 10_000;
/** The ribbon moves on in steps that can be seen, not at every second. */
const RIBBON_STEP_MS = 5000;
/** Beyond this, the time of day says more than a length. */
const LONG_MS = 3 * HOUR_MS;

interface LaneRowProps {
  id: number;
  isOpen: boolean;
  onOpen: ((id: number) => void) | null;
}

const dutyWords = { paused: 'on a break', offShift: 'off shift', onShift: null, noShiftSet: null } as const;

/** One crew's rover. Draws itself anew when its own lane changes, and once a second for what only the clock moves. */
export const LaneRow = memo(function LaneRow({ id, isOpen, onOpen }: LaneRowProps) {
  const lane = useLane(id);
  const now = useServerNow();
  const me = useMe();
  const lostFix = useLostFixOf(id);
  if (!lane) return null;
  const { state, since } = stateNow(lane, now);
  const { need } = needOf(lane, now, lostFix);
  const totals = totalsNow(lane, now);
  const to = Math.ceil(now / RIBBON_STEP_MS) * RIBBON_STEP_MS;
  const isHeard = state !== 'silent';
  const isOld = isHeard && lane.ageMs !== null && lane.ageMs > OLD_AGE_MS;
  const name = lane.crewName ?? 'No crew';
  const check = checkWords(lane.checkShot, me.timeZone);
  return (
    <div
      className="lane"
      data-need={need}
      data-open={isOpen}
      role="row"
      aria-label={[name, lane.roverLabel, check?.long].filter(Boolean).join(', ')}
    >
      <span className="lane-glyph" role="cell">
        <StateGlyph state={state} size={22} />
      </span>
      <span className="lane-crew" role="cell">
        {onOpen ? (
          <button
            type="button"
            className="lane-open"
            data-lane={id}
            aria-expanded={isOpen}
            onClick={() => onOpen(id)}
          >
            {name}
          </button>
        ) : (
          <strong>{name}</strong>
        )}
        <small>
          {lane.roverLabel}
          {check && (
            <span className="lane-check" data-counts={check.counts} title={check.long}>
              {check.short}
            </span>
          )}
        </small>
      </span>
      <span className="lane-state" role="cell">
        <strong style={{ color: `var(--${state}-text)` }}>{fixStateWords[state]}</strong>
        <small title={since === null ? undefined : utc(since)}>{sinceWords(since, now, me.timeZone)}</small>
      </span>
      <span className="lane-ribbon" role="cell">
        <SpanRibbon
          spans={ribbonNow(lane, now)}
          pauses={lane.pauses}
          from={to - HOUR_MS}
          to={to}
          zone={me.timeZone}
          label={`Last hour of ${name}`}
        />
        {lostFix ? (
          <LostFixNote
            lostFix={lostFix}
            canAct={onOpen !== null && me.role !== 'crewChief'}
            zone={me.timeZone}
          />
        ) : (
          <LaneNote lane={lane} now={now} />
        )}
      </span>
      <span className="lane-figure" role="cell" data-name="Satellites">
        {(isHeard ? lane.satellites : null) ?? '–'}
      </span>
      <span className="lane-figure" role="cell" data-name="Age" data-old={isOld}>
        {isHeard && lane.ageMs !== null ? age(lane.ageMs) : '–'}
        {isOld && <small>too old</small>}
      </span>
      <span className="lane-figure" role="cell" data-name="HDOP">
        {isHeard && lane.hdop !== null ? lane.hdop.toFixed(1) : '–'}
      </span>
      <span className="lane-base" role="cell" data-name="Base">
        {lane.mountPoint ?? '–'}
        {lane.baseDistanceM !== null && <small>{distance(lane.baseDistanceM, me.units)}</small>}
      </span>
      <span className="lane-site" role="cell" data-name="Site">
        {lane.siteName ?? '–'}
      </span>
      <span className="lane-uptime" role="cell" data-name="Fix uptime today">
        {percent(totals.fixedMs, wholeOf(totals))}
      </span>
    </div>
  );
});

/** How long the state has lasted; a clock time once it is long ago. */
function sinceWords(since: number | null, now: number, zone: string): string {
  if (since === null) return 'never heard';
  return now - since > LONG_MS ? `since ${clockTime(since, zone)}` : duration(now - since);
}

/** The newest span grows with the clock until it is held no longer. */
function ribbonNow(lane: Lane, now: number) {
  const last = lane.ribbon.at(-1);
  if (!last || lane.heldUntil === null || lane.since !== last.start) return lane.ribbon;
  return [...lane.ribbon.slice(0, -1), { ...last, end: Math.min(now, lane.heldUntil) }];
}

/** What to know or do about the lane, in words. */
function LaneNote({ lane, now }: { lane: Lane; now: number }) {
  const { need, since } = needOf(lane, now);
  if (need === 'quiet' && since !== null && now - since >= CALL_AFTER_MS)
    return (
      <p className="lane-note">
        <strong>Call the crew.</strong>{' '}
        {lane.crewPhone ? (
          <a href={`tel:${lane.crewPhone.replace(/[^+\d]/g, '')}`}>{lane.crewPhone}</a>
        ) : (
          'No number is kept.'
        )}
      </p>
    );
  if (need === 'quiet' && since === null)
    return <p className="lane-note">Not heard since the shift began.</p>;
  if (need === 'noFirstFix' && lane.ageMs === null)
    return (
      <p className="lane-note">
        <strong>No fix yet today, and no corrections.</strong> Check the correction login letter by letter.
      </p>
    );
  if (need === 'noFirstFix') return <p className="lane-note">No fix yet today.</p>;
  const words = dutyWords[lane.duty];
  return words ? <p className="lane-note">{words}</p> : null;
}
