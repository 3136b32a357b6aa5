import type { Me } from '@hubtack/contracts/auth/sign-in.js';
import type { ReactNode } from 'react';
import { distance } from '../lib/format';
import { planScale, scaleBarMetres, type Place, type PlanScale } from './plan-scale';
import './plain-plan.css';

const WIDTH = 1000;
const HEIGHT = 620;
const MARGIN = 60;
const LONGEST_BAR = 220;

interface PlainPlanProps {
  label: string;
  /** All that must be on it; at least one. */
  places: readonly Place[];
  units: Me['units'];
  /** What is drawn, in the plan's own units: 1000 across, 620 down. */
  children: (scale: PlanScale) => ReactNode;
  /** Said under it. */
  note: ReactNode;
}

/** A plain plan with north up and a scale bar: where things lie to one another, not a map. */
export function PlainPlan({ label, places, units, children, note }: PlainPlanProps) {
  const scale = planScale(places, WIDTH, HEIGHT, MARGIN);
  const bar = scaleBarMetres(scale.perMetre, LONGEST_BAR);
  return (
    <div className="plan">
      <svg viewBox={`0 0 ${WIDTH} ${HEIGHT}`} role="group" aria-label={label}>
        {children(scale)}
        <g transform={`translate(${MARGIN} ${HEIGHT - 26})`} stroke="var(--ink)" strokeWidth="1.5">
          <path d={`M0 -5V0H${bar * scale.perMetre}V-5`} fill="none" />
          <text x={bar * scale.perMetre + 8} y="2" fontSize="14" fill="var(--ink)" stroke="none">
            {distance(bar, units)}
          </text>
        </g>
        <g transform={`translate(${WIDTH - 50} 60)`} fill="none" stroke="var(--ink)" strokeWidth="1.5">
          <path d="M0 14V-14M-5 -6 0 -14 5 -6" />
          <text x="-5" y="32" fontSize="14" fill="var(--ink)" stroke="none">
            N
          </text>
        </g>
      </svg>
      <p className="caution">{note}</p>
    </div>
  );
}
