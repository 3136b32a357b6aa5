import type { Socket } from 'node:net';
import { exchange } from './exchange.js';
import { NtripProblem } from './problem.js';
import type { ReplyHead } from './reply-reader.js';
import type { NtripRequest } from './request.js';
import { readSourceTable, type SourceTable } from './source-table.js';

export interface TableLimits {
  /** Until the head of the answer, ms. */
  firstReplyMs: number;
  /** Until the end of the table, ms. */
  tableMs: number;
  /** A caster that marks no end and keeps the connection: so long without a byte is the end, ms. */
  idleMs: number;
}

/** The largest tables there are have some thousand records of a few hundred bytes. */
const MAX_TABLE_BYTES = 5 * 1024 * 1024;
const MAX_RECORDS = 20_000;
const END_MARK = 'ENDSOURCETABLE';

interface RawAnswer {
  head: ReplyHead | null;
  body: Buffer;
  end: 'complete' | 'idle' | 'time' | 'tooLong';
}

/** Asks for the table and collects what comes, within the limits. Rejects with the signal's reason only. */
export function askForTable(
  socket: Socket,
  request: NtripRequest,
  limits: TableLimits,
  signal: AbortSignal,
): Promise<RawAnswer> {
  return new Promise((resolve, reject) => {
    let head: ReplyHead | null = null;
    const parts: Uint8Array[] = [];
    let bytes = 0;
    let tail = '';
    const settle = (end: RawAnswer['end'] | Error) => {
      clearTimeout(idle);
      clearTimeout(whole);
      signal.removeEventListener('abort', onAbort);
      close();
      if (end instanceof Error) reject(end);
      else resolve({ head, body: Buffer.concat(parts), end });
    };
    const onAbort = () => settle(signal.reason as Error);
    let idle = setTimeout(() => settle('time'), limits.firstReplyMs);
    const whole = setTimeout(() => settle('time'), limits.firstReplyMs + limits.tableMs);
    signal.addEventListener('abort', onAbort, { once: true });
    const close = exchange(socket, request, {
      head: (found) => {
        head = found;
        clearTimeout(idle);
        if (found.kind === 'other') return settle('complete');
        idle = setTimeout(() => settle('idle'), limits.idleMs);
      },
      body: (chunk) => {
        idle.refresh();
        parts.push(Uint8Array.from(chunk));
        bytes += chunk.length;
        if (bytes > MAX_TABLE_BYTES) return settle('tooLong');
        tail = (tail + Buffer.from(chunk).toString('latin1')).slice(-chunk.length - END_MARK.length - 2);
        if (tail.includes(`\n${END_MARK}`)) settle('complete');
      },
      end: () => settle('complete'),
    });
  });
}

export interface TableFound {
  /** Null when the caster does not show one to us: the stream itself decides. */
  table: SourceTable | null;
  warnings: string[];
}

/** What the answer to a request for the table is. @throws NtripProblem when it is no caster's, or no end of it */
export function tableOf({ head, body, end }: RawAnswer, address: string): TableFound {
  if (head === null)
    throw new NtripProblem(
      end === 'time'
        ? `${address} takes the connection and says nothing.`
        : `${address} closed the connection without a word.`,
      'Check the port. If it is right, ask the operator whether the caster is up.',
    );
  const isText = /^(STR|CAS|NET);|^ENDSOURCETABLE/m.test(body.toString('latin1', 0, 4096));
  if (head.kind === 'http') {
    const other = httpAnswer(head, isText, address);
    if (other) return other;
  } else if (head.kind === 'error')
    return { table: null, warnings: [`the caster shows no source table: it answers “${head.firstLine}”`] };
  else if (head.kind !== 'table')
    throw new NtripProblem(
      `What answers at ${address} is no caster: it says “${head.firstLine}”.`,
      'Check address and port.',
    );
  if (end === 'tooLong' || end === 'time')
    throw new NtripProblem(
      end === 'tooLong'
        ? 'The source table does not end: more than 5 MB came.'
        : 'The source table does not end in time.',
      'Ask the operator: this is no source table that a rover could read either.',
    );
  const table = readSourceTable(body);
  if (table.records.STR > MAX_RECORDS)
    throw new NtripProblem(
      `The source table has ${table.records.STR} mount points; that is no real one.`,
      'Check the address.',
    );
  const length = head.headers.get('content-length');
  const warnings = [...table.oddities];
  if (head.kind === 'table' && length !== undefined && Number(length) !== body.length)
    warnings.push('its stated length does not fit');
  return { table, warnings };
}

function httpAnswer({ status, headers }: ReplyHead, isTable: boolean, address: string): TableFound | null {
  if (status !== null && status >= 300 && status < 400)
    throw new NtripProblem(
      `${address} sends us on to ${headers.get('location')?.slice(0, 200) ?? 'another address'}.`,
      'Casters do not do that: check the address, or write the one that it names if you trust it.',
    );
  if (status === 401 || status === 403)
    return { table: null, warnings: ['the caster shows its source table to nobody without a login'] };
  if (status !== 200)
    return { table: null, warnings: [`the caster shows no source table (answer ${status})`] };
  const encoding = headers.get('content-encoding');
  if (encoding !== undefined && encoding !== 'identity')
    throw new NtripProblem(
      `The answer is compressed (${encoding.slice(0, 20)}), which nobody asked for and no rover reads.`,
      'Check address and port; ask the operator.',
    );
  if (isTable || /sourcetable/i.test(headers.get('content-type') ?? '')) return null;
  throw new NtripProblem(
    `What answers at ${address} is a web page, not a caster.`,
    'Check address and port: 2101 is the usual port of casters.',
  );
}
