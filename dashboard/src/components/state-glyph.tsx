import { fixStateWords, type FixState } from '@hubtack/contracts/fixes/fix-state.js';
import { memo } from 'react';

interface StateGlyphProps {
  state: FixState;
  size?: number;
  /** Beside its word the glyph is for the eye only. */
  decorative?: boolean;
}

/** Hub and tack: a square seen from above, and where the tack sits in it. Shape first, then colour. */
export const StateGlyph = memo(function StateGlyph({ state, size = 20, decorative = true }: StateGlyphProps) {
  const label = decorative ? { 'aria-hidden': true } : { role: 'img', 'aria-label': fixStateWords[state] };
  return (
    <svg
      width={size}
      height={size}
      viewBox="0 0 20 20"
      {...label}
      style={{ color: `var(--${state})`, flex: 'none' }}
    >
      {state === 'fixed' && (
        <>
          <rect x="2" y="2" width="16" height="16" rx="1" fill="currentColor" />
          <circle cx="10" cy="10" r="2.6" fill="var(--raised)" />
        </>
      )}
      {state === 'float' && (
        <>
          <rect
            x="3"
            y="3"
            width="14"
            height="14"
            rx="1.5"
            fill="none"
            stroke="currentColor"
            strokeWidth="2"
          />
          <circle cx="12.6" cy="7.4" r="2.6" fill="currentColor" />
        </>
      )}
      {state === 'code' && (
        <>
          <rect
            x="2"
            y="5.5"
            width="12.5"
            height="12.5"
            rx="1.5"
            fill="none"
            stroke="currentColor"
            strokeWidth="2"
          />
          <circle cx="17" cy="3" r="2.6" fill="currentColor" />
        </>
      )}
      {state === 'none' && (
        <rect x="3" y="3" width="14" height="14" rx="1.5" fill="none" stroke="currentColor" strokeWidth="2" />
      )}
      {state === 'silent' && (
        <rect
          x="3"
          y="3"
          width="14"
          height="14"
          rx="1.5"
          fill="none"
          stroke="currentColor"
          strokeWidth="2"
          strokeDasharray="3.5 3"
        />
      )}
    </svg>
  );
});
