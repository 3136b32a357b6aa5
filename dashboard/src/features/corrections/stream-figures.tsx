import type { CheckedStream } from '@hubtack/contracts/corrections/check.js';
import { DataTable } from '../../components/data-table';

const grouped = new Intl.NumberFormat('en-GB');
const seconds = (value: number): string => `${value.toFixed(value < 10 ? 1 : 0)} s`;

/** What arrived while the check listened. */
export function StreamFigures({ stream }: { stream: CheckedStream }) {
  return (
    <section className="check-part" aria-label="The stream">
      <h3>The stream</h3>
      <dl className="facts">
        <div>
          <dt>Rate</dt>
          <dd>{grouped.format(Math.round(stream.bytesPerSecond))} bytes/s</dd>
        </div>
        <div>
          <dt>First byte after</dt>
          <dd>{stream.firstByteMs === null ? 'none came' : seconds(stream.firstByteMs / 1000)}</dd>
        </div>
        <div>
          <dt>Frames with right CRC</dt>
          <dd>{grouped.format(stream.frames)}</dd>
        </div>
        <div>
          <dt>Frames dropped</dt>
          <dd>{grouped.format(stream.badFrames)}</dd>
        </div>
        <div>
          <dt>Bytes outside frames</dt>
          <dd>
            {grouped.format(stream.otherBytes)} of {grouped.format(stream.bytes)}
          </dd>
        </div>
        <div>
          <dt>Constellations</dt>
          <dd>{stream.constellations.join(', ') || 'none seen'}</dd>
        </div>
      </dl>
      {stream.messages.length > 0 && (
        <DataTable
          label="Messages in the stream"
          rows={stream.messages}
          rowKey={({ number }) => number}
          columns={[
            { name: 'Message', cell: ({ number }) => <strong>{number}</strong> },
            { name: 'What it is', cell: ({ name }) => name },
            { name: 'Count', figure: true, cell: ({ count }) => count },
            {
              name: 'Every',
              figure: true,
              cell: ({ intervalSeconds }) => (intervalSeconds === null ? '–' : seconds(intervalSeconds)),
            },
          ]}
        />
      )}
    </section>
  );
}
