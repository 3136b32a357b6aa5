import { board } from './board.js';
import { diagnosis } from './diagnosis.js';
import { flag } from './flag.js';
import { ingestAnswer, ingestHttp1, ingestHttp60, capacity } from './ingest-http.js';
import { ingestTcp } from './ingest-tcp.js';
import { logs } from './logs.js';
import { notices } from './notices.js';
import { printRow, type Row } from './report.js';
import { fanOut, freshness, stalled } from './stream.js';
import { timelineQuery } from './timeline-query.js';
import { weekly } from './weekly.js';

const args = process.argv.slice(2);
/** Of whatever is simulated: other seeds than the usual one try what nobody has looked at. */
const seed = Number(args.find((arg) => arg.startsWith('--seed='))?.slice('--seed='.length) ?? 1);

const benches: Record<string, () => Promise<Row[]>> = {
  'ingest/tcp': ingestTcp,
  'ingest/http-60': ingestHttp60,
  'ingest/http-1': ingestHttp1,
  'ingest/answer': ingestAnswer,
  'stream/fan-out': fanOut,
  'stream/freshness': freshness,
  'stream/stalled': stalled,
  'timeline/query': timelineQuery,
  board,
  diagnosis: () => diagnosis(seed),
  notices: () => notices(seed),
  flag,
  logs,
  weekly,
  capacity,
};

const asJson = args.includes('--json');
const wanted = args.filter((arg) => !arg.startsWith('--'));
const names = Object.keys(benches).filter(
  (name) => wanted.length === 0 || wanted.some((word) => name.startsWith(word)),
);
if (names.length === 0) {
  console.error(`There is no such benchmark. There are: ${Object.keys(benches).join(', ')}`);
  process.exit(2);
}
for (const name of names) for (const row of await benches[name]!()) printRow(row, asJson);
process.exit(0);
