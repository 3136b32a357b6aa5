import { ReplyReader, type ReplyHead } from '@hubtack/backend/corrections/ntrip/reply-reader.js';
import { readSourceTable } from '@hubtack/backend/corrections/ntrip/source-table.js';
import { listedMessages } from '@hubtack/backend/corrections/check/formats.js';
import { expect, it } from 'vitest';
import { recording } from '../harness/recordings.js';

/** What a real caster answered in 2017 (tests/fixtures/README.md), its eight lines of header by the collector cut off. */
const recorded = recording('ntrip_sourcetable.log');
const answer = recorded.subarray(recorded.indexOf('SOURCETABLE 200 OK'));

function read(bytes: Buffer, pieces: number): { head: ReplyHead; body: Buffer } {
  let head: ReplyHead | null = null;
  const parts: Uint8Array[] = [];
  const reader = new ReplyReader({
    head: (found) => (head = found),
    body: (part) => parts.push(Uint8Array.from(part)),
    done: () => undefined,
  });
  for (let at = 0; at < bytes.length; at += pieces) reader.push(bytes.subarray(at, at + pieces));
  reader.end();
  return { head: head!, body: Buffer.concat(parts) };
}

it.each([1, 7, 100_000])(
  'a real source table in pieces of %d bytes: 15 casters, 1 network, 4 mount points',
  (pieces) => {
    const { head, body } = read(answer, pieces);
    expect(head).toMatchObject({ kind: 'table', firstLine: 'SOURCETABLE 200 OK' });
    const table = readSourceTable(body);
    expect(table.records).toEqual({ CAS: 15, NET: 1, STR: 4, other: 0 });
    expect(table).toMatchObject({ isEnded: true, oddities: [] });
    expect(table.mountPoints.map(({ mountPoint }) => mountPoint)).toEqual([
      'VRS_3_2G',
      'MAC_3_2G',
      'FKP_3_2G',
      'EPS',
    ]);
    expect(table.mountPoints[0]).toMatchObject({
      identifier: 'SAPOS_VRS_3',
      format: 'RTCM3.1',
      constellations: 'GPS+GLO',
      country: 'DEU',
      latitude: 52.48,
      longitude: 13.3,
      wantsPosition: true,
      isNetwork: true,
      authentication: 'basic',
      fee: true,
      bitrate: 2000,
    });
    expect([...listedMessages(table.mountPoints[0]!.formatDetails).keys()]).toEqual([
      1004, 1005, 1006, 1007, 1008, 1012, 1021, 1023, 1025, 1030, 1031, 1032, 1033,
    ]);
  },
);

it('the example of the NTRIP 1.0 document: 19 fields, the last one free text', () => {
  // RTCM 10410.0, open edition, as reproduced in the project's reference; the generator is left out there.
  const str =
    'STR;WSRT0;Westerbork;RTCM 3.0;1004(1),1006(10),1008(10);2;GPS;IGS;NLD;52.91;6.60;0;0;x;none;B;N;1300;NRCan';
  const { mountPoints } = readSourceTable(Buffer.from(`${str}\r\nENDSOURCETABLE\r\n`));
  expect(mountPoints).toEqual([
    {
      mountPoint: 'WSRT0',
      identifier: 'Westerbork',
      format: 'RTCM 3.0',
      formatDetails: '1004(1),1006(10),1008(10)',
      constellations: 'GPS',
      network: 'IGS',
      country: 'NLD',
      latitude: 52.91,
      longitude: 6.6,
      distanceM: null,
      wantsPosition: false,
      isNetwork: false,
      authentication: 'basic',
      fee: false,
      bitrate: 1300,
    },
  ]);
  expect([...listedMessages(mountPoints[0]!.formatDetails)]).toEqual([
    [1004, 1],
    [1006, 10],
    [1008, 10],
  ]);
});
