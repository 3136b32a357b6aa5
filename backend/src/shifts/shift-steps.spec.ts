import type { PauseReason, ShiftStep } from '@hubtack/contracts/shifts/shift.js';
import { describe, expect, it } from 'vitest';
import { stepOf, type MarkedPause, type StepShift } from './shift-steps.js';

const shift = (id: number | null, pauses: MarkedPause[] = [], end: number | null = null): StepShift => ({
  id,
  start: 100,
  end,
  isFinished: false,
  pauses,
});
const states: Record<string, StepShift | null> = {
  'no shift': null,
  planned: shift(null, [], 900),
  running: shift(7),
  paused: shift(7, [{ id: 3, start: 200, end: null }]),
  'running again': shift(7, [{ id: 3, start: 200, end: 250 }]),
};
const step = (name: ShiftStep, state: string, at = 300, reason: PauseReason | undefined = 'lunch') =>
  stepOf(name, at, reason, states[state]!, null, String);

describe('every step from every state', () => {
  const refused = (text: string) => ({ refusal: text });
  it.each([
    ['start', 'no shift', { effect: { do: 'start', at: 300 } }],
    ['start', 'planned', { effect: { do: 'start', at: 300 } }],
    ['start', 'running', refused('The shift has been running since 100.')],
    ['start', 'paused', refused('The shift has been running since 100.')],
    ['start', 'running again', refused('The shift has been running since 100.')],
    ['pause', 'no shift', refused('No shift is running at 300. Start it first.')],
    ['pause', 'planned', { effect: { do: 'pause', shift: states.planned, at: 300, reason: 'lunch' } }],
    ['pause', 'running', { effect: { do: 'pause', shift: states.running, at: 300, reason: 'lunch' } }],
    ['pause', 'paused', refused('The shift has been paused since 200.')],
    [
      'pause',
      'running again',
      { effect: { do: 'pause', shift: states['running again'], at: 300, reason: 'lunch' } },
    ],
    ['resume', 'no shift', refused('No shift is running at 300. Start it first.')],
    ['resume', 'planned', refused('The shift is not paused at 300.')],
    ['resume', 'running', refused('The shift is not paused at 300.')],
    ['resume', 'paused', { effect: { do: 'resume', pauseId: 3, at: 300 } }],
    ['resume', 'running again', refused('The shift is not paused at 300.')],
    ['finish', 'no shift', refused('No shift is running at 300. Start it first.')],
    ['finish', 'planned', { effect: { do: 'finish', shift: states.planned, at: 300, openPauseId: null } }],
    ['finish', 'running', { effect: { do: 'finish', shift: states.running, at: 300, openPauseId: null } }],
    ['finish', 'paused', { effect: { do: 'finish', shift: states.paused, at: 300, openPauseId: 3 } }],
    [
      'finish',
      'running again',
      { effect: { do: 'finish', shift: states['running again'], at: 300, openPauseId: null } },
    ],
  ] as const)('%s, %s', (name, state, expected) => {
    expect(step(name, state)).toEqual(expected);
  });
});

it('a pause says why', () => {
  expect(stepOf('pause', 300, undefined, states.running!, null, String)).toEqual({
    refusal: 'A pause needs a reason.',
  });
});
it('a tap that comes after later ones is refused when it contradicts them', () => {
  expect(step('pause', 'running again', 150)).toEqual({
    refusal: 'A pause at 200, later than this, is marked already.',
  });
  expect(step('resume', 'paused', 200)).toEqual({ refusal: 'The shift is not paused at 200.' });
  expect(step('pause', 'running again', 220)).toEqual({ refusal: 'The shift has been paused since 200.' });
  expect(step('finish', 'running again', 220)).toEqual({
    refusal: 'A pause until 250, later than this, is marked already.',
  });
  const finished: StepShift = { ...shift(7, [], 900), isFinished: true };
  expect(stepOf('finish', 300, undefined, finished, null, String)).toEqual({
    refusal: 'The shift was finished at 900.',
  });
  expect(stepOf('start', 50, undefined, null, 100, String)).toEqual({
    refusal: 'A shift that begins at 100 is marked already.',
  });
});
