import { describe, expect, it } from 'vitest';
import { outcomeOf } from './outcome';

const refusal = {
  type: 'about:blank',
  title: 'Conflict',
  status: 409,
  detail: 'The shift is paused already.',
  code: 'conflict',
  correlationId: 'x',
};

describe('what an answer means for a tap', () => {
  it.each([500, 502, 503, 504, 408, 429])('%d keeps it', (status) => {
    expect(outcomeOf('shift', status, null, null)).toEqual({ kind: 'later', waitMs: null });
  });
  it.each([400, 403, 404, 409, 413, 415])('%d refuses it', (status) => {
    expect(outcomeOf('shift', status, null, null)).toEqual({
      kind: 'refused',
      reason: `The server answers ${status}.`,
    });
  });
  it('says why, in the words of the server, fields included', () => {
    const errors = [{ pointer: '/note', detail: 'At most 400 characters' }];
    expect(outcomeOf('shift', 409, { ...refusal, errors }, null)).toEqual({
      kind: 'refused',
      reason: 'The shift is paused already. At most 400 characters',
    });
  });
  it('401 waits for a sign-in', () => {
    expect(outcomeOf('flag', 401, refusal, null)).toEqual({ kind: 'signIn' });
  });
  it('keeps to the time that the server asked for', () => {
    expect(outcomeOf('flag', 429, null, '12')).toEqual({ kind: 'later', waitMs: 12_000 });
    expect(outcomeOf('flag', 503, null, 'Wed, 21 Oct 2026 07:28:00 GMT')).toEqual({
      kind: 'later',
      waitMs: null,
    });
  });
  it('a flag gives the id that its photos need', () => {
    expect(outcomeOf('flag', 201, { id: 42, more: true }, null)).toMatchObject({
      kind: 'done',
      answerId: 42,
    });
    expect(outcomeOf('shift', 200, { crewId: 3 }, null)).toMatchObject({ kind: 'done' });
    expect(outcomeOf('photo', 201, [], null)).toMatchObject({ kind: 'done' });
  });
  it('a sign-on page in place of the server\u2019s answer is none', () => {
    for (const kind of ['flag', 'shift', 'photo'] as const)
      expect(outcomeOf(kind, 200, null, null)).toEqual({ kind: 'later', waitMs: null });
    expect(outcomeOf('flag', 200, { login: 'here' }, null)).toMatchObject({ kind: 'later' });
  });
});
