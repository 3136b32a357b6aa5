import type { CheckedStream } from '@hubtack/contracts/corrections/check.js';
import { tookWords } from './check-words';

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
          <dd>{stream.firstByteMs === null ? 'none came' : tookWords(stream.firstByteMs)}</dd>
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
        <table className="message-table" aria-label="Messages in the stream">
          <thead>
            <tr>
              <th scope="col">Message</th>
              <th scope="col">What it is</th>
              <th scope="col">Count</th>
              <th scope="col">Every</th>
            </tr>
          </thead>
          <tbody>
            {stream.messages.map(({ number, name, count, intervalSeconds }) => (
              <tr key={number}>
                <th scope="row">{number}</th>
                <td>{name}</td>
                <td>{count}</td>
                <td>{intervalSeconds === null ? '–' : seconds(intervalSeconds)}</td>
              </tr>
            ))}
          </tbody>
        </table>
      )}
    </section>
  );
}
