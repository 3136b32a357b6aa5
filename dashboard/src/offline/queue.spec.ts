import { beforeEach, describe, expect, it } from 'vitest';
import { dismissed, drain, nextTap, waitBeforeMs, type DrainParts } from './queue';
import type { NewTap, Outcome, Tap, TapStore } from './tap';

class MemoryTaps implements TapStore {
  taps: Tap[] = [];
  private last = 0;
  async all() {
    return structuredClone(this.taps);
  }
  async add(taps: readonly NewTap[]) {
    for (const tap of taps) this.taps.push({ ...tap, order: ++this.last });
  }
  async settle(gone: readonly string[], changed: readonly Tap[]) {
    this.taps = this.taps
      .filter(({ id }) => !gone.includes(id))
      .map((tap) => changed.find(({ id }) => id === tap.id) ?? tap);
  }
}

const tap = (id: string, change: Partial<NewTap> = {}): NewTap => ({
  id,
  userId: 1,
  at: 1000,
  words: id,
  kind: 'shift',
  url: `/api/crews/1/shift/${id}`,
  body: {},
  under: null,
  refusal: null,
  ...change,
});
const flag = (id: string) => tap(id, { kind: 'flag', url: '/api/lost-fixes' });
const photo = (id: string, under: string) =>
  tap(id, { kind: 'photo', url: '/api/lost-fixes/:under/photos', under });
const done = (answerId = 7): Outcome => ({ kind: 'done', answer: { id: answerId }, answerId });
const later: Outcome = { kind: 'later', waitMs: null };

let store: MemoryTaps;
let sent: string[];
let answers: Record<string, Outcome>;
let parts: DrainParts;
beforeEach(() => {
  store = new MemoryTaps();
  sent = [];
  answers = {};
  parts = {
    store,
    whose: () => 1,
    onDone: async () => undefined,
    send: async ({ id, url }) => {
      sent.push(`${id} ${url}`);
      return answers[id] ?? done();
    },
  };
});
const idsSent = () => sent.map((one) => one.split(' ')[0]);
const left = () => store.taps.map(({ id, refusal }) => (refusal === null ? id : `${id}: ${refusal}`));

describe('what waits is sent', () => {
  it('oldest first, each once, and then nothing is left', async () => {
    await store.add([tap('start'), flag('lost'), tap('pause')]);
    expect(await drain(parts)).toEqual({ kind: 'empty' });
    expect(idsSent()).toEqual(['start', 'lost', 'pause']);
    expect(left()).toEqual([]);
    await drain(parts);
    expect(sent).toHaveLength(3);
  });

  it('without signal the first one stays, and none goes ahead of it', async () => {
    await store.add([tap('pause'), tap('resume')]);
    answers.pause = later;
    expect(await drain(parts)).toEqual({ kind: 'later', waitMs: null, moved: false });
    expect(idsSent()).toEqual(['pause']);
    expect(left()).toEqual(['pause', 'resume']);
    answers = {};
    await drain(parts);
    expect(idsSent()).toEqual(['pause', 'pause', 'resume']);
  });

  it('says that something went out before it came to a stop, and how long the server asked for', async () => {
    await store.add([tap('start'), tap('pause')]);
    answers.pause = { kind: 'later', waitMs: 9000 };
    expect(await drain(parts)).toEqual({ kind: 'later', waitMs: 9000, moved: true });
    expect(left()).toEqual(['pause']);
  });

  it('a refused one is kept with its reason, and the ones behind go on', async () => {
    await store.add([tap('start'), tap('pause')]);
    answers.start = { kind: 'refused', reason: 'The shift has started already.' };
    expect(await drain(parts)).toEqual({ kind: 'empty' });
    expect(left()).toEqual(['start: The shift has started already.']);
    await drain(parts);
    expect(idsSent()).toEqual(['start', 'pause']);
  });

  it('waits for a sign-in, refused or missing', async () => {
    await store.add([tap('pause')]);
    answers.pause = { kind: 'signIn' };
    expect(await drain(parts)).toEqual({ kind: 'signIn' });
    expect(await drain({ ...parts, whose: () => null })).toEqual({ kind: 'signIn' });
    expect(idsSent()).toEqual(['pause']);
    expect(left()).toEqual(['pause']);
  });

  it('what one person tapped never goes out with another one\u2019s sign-in, not even in mid-queue', async () => {
    await store.add([tap('mine'), tap('mineToo'), tap('theirs', { userId: 2 })]);
    let who = 1;
    parts.whose = () => who;
    parts.onDone = async () => {
      who = 2;
    };
    await drain(parts);
    expect(idsSent()).toEqual(['mine', 'theirs']);
    expect(left()).toEqual(['mineToo']);
  });

  it('a tap made while sending goes out in the same round', async () => {
    await store.add([tap('start')]);
    parts.onDone = async ({ id }) => {
      if (id === 'start') await store.add([tap('pause')]);
    };
    await drain(parts);
    expect(idsSent()).toEqual(['start', 'pause']);
  });

  it('a page that closes before it has noted the answer sends the same key again', async () => {
    await store.add([flag('lost')]);
    const settle = store.settle.bind(store);
    store.settle = () => Promise.reject(new Error('closed'));
    await expect(drain(parts)).rejects.toThrow('closed');
    store.settle = settle;
    await drain(parts);
    expect(idsSent()).toEqual(['lost', 'lost']);
    expect(left()).toEqual([]);
  });
});

describe('photos of a flag', () => {
  it('follow it, under the id that it was given', async () => {
    await store.add([flag('lost'), photo('a', 'lost'), photo('b', 'lost')]);
    answers.lost = done(42);
    await drain(parts);
    expect(sent).toEqual([
      'lost /api/lost-fixes',
      'a /api/lost-fixes/42/photos',
      'b /api/lost-fixes/42/photos',
    ]);
  });
  it('do not hold up what was tapped after them', async () => {
    await store.add([flag('lost'), photo('a', 'lost'), tap('finish')]);
    answers.a = later;
    await drain(parts);
    expect(idsSent()).toEqual(['lost', 'finish', 'a']);
    expect(left()).toEqual(['a']);
  });
  it('stay behind with a flag that was refused, and leave with it', async () => {
    await store.add([flag('lost'), photo('a', 'lost'), tap('pause')]);
    answers.lost = { kind: 'refused', reason: 'Not your rover.' };
    await drain(parts);
    expect(idsSent()).toEqual(['lost', 'pause']);
    expect(dismissed(store.taps, 'lost')).toEqual(['lost', 'a']);
  });
});

it('nothing to send for somebody who has tapped nothing', () => {
  expect(nextTap([], 1)).toBeUndefined();
  expect(nextTap([{ ...tap('theirs'), order: 1 }], 2)).toBeUndefined();
});

it.each([
  [1, null, 0.5, 2000],
  [2, null, 0.5, 4000],
  [3, null, 0, 5600],
  [20, null, 0.5, 60_000],
  [1, 30_000, 0.5, 30_000],
  [1, 3_600_000, 0.5, 300_000],
])('after failure %d, asked for %s ms: the next try comes in %d', (failures, asked, chance, expected) => {
  expect(waitBeforeMs(failures, asked, chance)).toBeCloseTo(expected);
});
