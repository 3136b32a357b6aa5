import { lostFixKindWords, type LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';

/** The notch in the ribbon, as a mark: open while it lasts, closed once it has ended; and the word. */
export function KindMark({ lostFix }: { lostFix: LostFix }) {
  const { kind, endAt, flag } = lostFix;
  const words = flag?.word === 'fixLooksWrong' ? 'Fix looks wrong' : lostFixKindWords[kind];
  const shape = {
    lostFix: 'M1 3h6v9h6V3h6',
    noFirstFix: 'M1 12h12V3h6',
    notHeard: 'M1 12h3m3 0h3m3 0h3',
    mountPoint: 'M1 3h4v9h3V3h4v9h3V3h4',
    flag: 'M4 17V3h12l-4 3.5 4 3.5H4',
  }[kind];
  return (
    <span className="kind-mark">
      <svg width="20" height="18" viewBox="0 0 20 18" aria-hidden>
        <path
          d={shape}
          fill={kind === 'flag' ? 'currentColor' : 'none'}
          stroke="currentColor"
          strokeWidth="2"
          opacity={endAt === null ? 1 : 0.55}
        />
      </svg>
      <strong>{words}</strong>
    </span>
  );
}
