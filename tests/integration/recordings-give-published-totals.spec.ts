import { connect } from 'node:net';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { forward } from '@hubtack/simulators/replay/forwarder.js';
import { firstDayOf } from '@hubtack/simulators/replay/line-time.js';
import { LineSplitter } from '@hubtack/simulators/replay/line-splitter.js';
import { replay } from '@hubtack/simulators/replay/replay.js';
import { fileSource } from '@hubtack/simulators/replay/sources.js';
import { Spool } from '@hubtack/simulators/replay/spool.js';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { postSentences } from '../harness/client.js';
import { published, recording, recordingFile } from '../harness/recordings.js';
import { startServer, type TestServer } from '../harness/server.js';
import { timelineOf } from '../harness/timeline.js';
import { until } from '../harness/until.js';

let server: TestServer;
beforeAll(async () => {
  // The recordings are years old: the server is told to keep, and so to take, epochs of that age.
  server = await startServer({ RAW_EPOCH_DAYS: '100000' });
});
afterAll(() => server.close());

type Recording = (typeof published)[keyof typeof published];

async function expectPublished(roverId: number, { from, to, totals, changes }: Recording): Promise<void> {
  const answer = await timelineOf(await server.as('manager'), roverId, from, to);
  expect(answer.totals).toEqual(totals);
  expect(answer.spans.slice(1).map(({ start }) => start)).toEqual(changes);
  expect([answer.spans[0]!.start, answer.spans.at(-1)!.end]).toEqual([from, to]);
}

/** Sends bytes over TCP in pieces that have nothing to do with lines. */
async function sendOverTcp(key: string, bytes: Buffer, pieceSize: number): Promise<void> {
  const socket = connect(server.tcpPort, '127.0.0.1');
  socket.write(`KEY ${key}\r\n`);
  for (let at = 0; at < bytes.length; at += pieceSize) {
    const piece = bytes.subarray(at, at + pieceSize);
    if (!socket.write(piece)) await new Promise((resolve) => socket.once('drain', resolve));
  }
  await new Promise<void>((resolve) => {
    socket.once('close', () => resolve());
    socket.end();
  });
}

describe.each([published.walk, published.rtkLog])('$file', (expected) => {
  it('in one post', async () => {
    const rover = await server.makeRover();
    const { body } = await postSentences(server.url, rover.key, recording(expected.file));
    expect(body).toMatchObject({ accepted: expected.epochs, duplicates: 0, rejected: 0 });
    await expectPublished(rover.id, expected);
  });

  it('in posts of sixty lines, each sent twice', async () => {
    const rover = await server.makeRover();
    const lines = recording(expected.file)
      .toString('latin1')
      .split(/(?<=\n)/);
    let [accepted, duplicates] = [0, 0];
    for (let at = 0; at < lines.length; at += 60) {
      for (let time = 0; time < 2; time++) {
        const { body } = await postSentences(server.url, rover.key, lines.slice(at, at + 60).join(''));
        accepted += body.accepted;
        duplicates += body.duplicates as number;
      }
    }
    expect([accepted, duplicates]).toEqual([expected.epochs, expected.epochs]);
    await expectPublished(rover.id, expected);
  });

  it.each([1_000_000, 1447, 61])('over TCP in pieces of %d bytes', async (pieceSize) => {
    const rover = await server.makeRover();
    await sendOverTcp(rover.key, recording(expected.file), pieceSize);
    await until(() => expectPublished(rover.id, expected));
  });

  it('through the sender', async () => {
    const rover = await server.makeRover();
    const folder = mkdtempSync(join(tmpdir(), 'hubtack-spool-'));
    const spool = new Spool(folder);
    const firstDay = firstDayOf(new LineSplitter().push(recording(expected.file)));
    const source = fileSource(recordingFile(expected.file));
    await replay({ source, firstDay, speed: Infinity, keep: (post) => spool.keep(post) });
    const sent = await forward({ url: server.url, key: rover.key, spool, isFinished: () => true });
    rmSync(folder, { recursive: true });
    expect(sent).toMatchObject({ accepted: expected.epochs, duplicates: 0, rejected: 0 });
    await expectPublished(rover.id, expected);
  });
});
