import { describe, expect, it } from 'vitest';
import { changesFor, doubtsAbout, formatOf } from './choose';
import { makeMountPoint, makeSource } from '../../testing/make-mount-point';

describe('the kind of messages that a source table names', () => {
  it.each([
    ['1005(10),1077(1),1087(1)', 'msm'],
    // The STR example of NTRIP 1.0.
    ['1004(1),1006(10),1008(10)', 'legacy'],
    ['1004(1),1074(1)', 'any'],
    ['1005(10),1230(10)', null],
    ['', null],
    [null, null],
    // MSM ends with 1 to 7: 1078 and 1080 are none.
    ['1078,1080', null],
  ])('%s', (formatDetails, format) => {
    expect(formatOf({ formatDetails })).toBe(format);
  });
});

describe('choosing a mount point into a source', () => {
  it('changes the mount point, the position and the format when the table says so', () => {
    const chosen = makeMountPoint('TASNET', { wantsPosition: true, formatDetails: '1077(1)' });
    expect(changesFor(makeSource(), chosen).map(({ body }) => body)).toEqual([
      { mountPoint: 'TASNET' },
      { sendPosition: true },
      { expectedFormat: 'msm' },
    ]);
  });
  it('leaves alone what the table is silent about', () => {
    const changes = changesFor(
      makeSource({ sendPosition: true, expectedFormat: 'msm' }),
      makeMountPoint('MILR00'),
    );
    expect(changes.map(({ field }) => field)).toEqual(['mountPoint']);
  });
  it('changes nothing when everything is so already', () => {
    expect(changesFor(makeSource(), makeMountPoint('TANF00', { wantsPosition: false }))).toEqual([]);
  });
  it('says what to think of: the other kind of messages, a login that is missing, a fee', () => {
    const chosen = makeMountPoint('OLD1', {
      formatDetails: '1004(1)',
      authentication: 'basic',
      fee: true,
      wantsPosition: true,
    });
    const doubts = doubtsAbout(makeSource({ expectedFormat: 'msm', hasPassword: false }), chosen).join('\n');
    expect(doubts).toMatch(/legacy messages/);
    expect(doubts).toMatch(/no password is kept/);
    expect(doubts).toMatch(/charges/);
    expect(doubts).toMatch(/tell the crews/);
  });
});
