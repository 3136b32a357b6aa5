import { type Mark, type Verdict } from './check-words';

const colours: Record<Mark, string> = {
  waiting: 'silent',
  running: 'silent',
  pass: 'fixed',
  warned: 'float',
  fail: 'code',
  skipped: 'silent',
};

/** How a step or a check came out: shape first (tick, bar, cross), then the word beside it, then colour. */
function OutcomeGlyph({ mark }: { mark: Mark }) {
  return (
    <svg
      width="20"
      height="20"
      viewBox="0 0 20 20"
      aria-hidden
      fill="none"
      stroke="currentColor"
      strokeWidth="2"
    >
      {mark === 'pass' && (
        <>
          <circle cx="10" cy="10" r="9" fill="currentColor" stroke="none" />
          <path d="M5.5 10.5 8.7 13.6 14.5 7" stroke="var(--raised)" />
        </>
      )}
      {mark === 'warned' && (
        <>
          <circle cx="10" cy="10" r="8" />
          <path d="M5.8 10.4 8.8 13.2 14.2 7.2" />
        </>
      )}
      {mark === 'fail' && (
        <>
          <path d="M10 1 19 10 10 19 1 10z" fill="currentColor" stroke="none" />
          <path d="M7 7 13 13M13 7 7 13" stroke="var(--raised)" />
        </>
      )}
      {mark === 'running' && (
        <>
          <circle cx="10" cy="10" r="8" strokeOpacity="0.35" />
          <path className="outcome-turning" d="M10 2A8 8 0 0 1 18 10" />
        </>
      )}
      {mark === 'waiting' && <circle cx="10" cy="10" r="8" strokeDasharray="2.5 2.6" />}
      {mark === 'skipped' && <path d="M4 10H16" />}
    </svg>
  );
}

/** The shape with its word. */
export const OutcomeMark = ({ mark, words }: Verdict) => (
  <span className="outcome" style={{ color: `var(--${colours[mark]}-text)` }}>
    <OutcomeGlyph mark={mark} />
    <span>{words}</span>
  </span>
);
