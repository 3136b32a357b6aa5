import { Button, Field, Textarea } from '@fluentui/react-components';
import { fixStateOfQuality } from '@hubtack/contracts/fixes/fix-state.js';
import { explainText, type ExplainedLine } from '@hubtack/contracts/nmea/explain.js';
import { useDeferredValue, useMemo, useState } from 'react';
import { StateGlyph } from '../../components/state-glyph';
import './sentence-reader.css';

const MOST_BYTES = 5 * 1024 * 1024;
/** Lines that are shown at once; the summary counts all. */
const PAGE = 60;
const example = '$GNGGA,133859.80,4134.50180205,N,09345.03586649,W,4,19,0.7,280.827,M,-31.442,M,5.8,0002*6D';

function Line({ line }: { line: ExplainedLine }) {
  const { sentence, checksum, problem } = line;
  return (
    <li className="sentence" data-bad={problem !== null}>
      <h2>
        <small>{line.line}</small>
        {sentence?.type === 'gga' && <StateGlyph state={fixStateOfQuality(sentence.quality)} />}
        {line.title ?? 'Not a sentence'}
      </h2>
      <pre tabIndex={0} aria-label={`Line ${line.line}`}>
        {line.text}
      </pre>
      {problem && (
        <p className="sentence-problem">
          <strong>Not used: {problem.words}.</strong> {problem.advice}
        </p>
      )}
      <p className="sentence-frame">
        {line.bytes} bytes with line end
        {checksum && ` · checksum ${checksum.given || 'missing'}, the characters give ${checksum.computed}`}
      </p>
      {line.fields.length > 0 && (
        <dl>
          {line.fields.map((field, index) => (
            <div key={index}>
              <dt>{field.name}</dt>
              <dd>
                <code>{field.raw || ' '}</code> {field.reading}
                {field.warning && <em> {field.warning}</em>}
              </dd>
            </div>
          ))}
        </dl>
      )}
    </li>
  );
}

function Summary({ lines }: { lines: ExplainedLine[] }) {
  const sentences = lines.filter(({ problem }) => problem === null);
  const gga = sentences.filter(({ sentence }) => sentence?.type === 'gga');
  return (
    <p role="status">
      {lines.length} lines: {sentences.length} good sentences, {gga.length} of them GGA;{' '}
      {lines.length - sentences.length} not used.{' '}
      {lines.length > PAGE && `The first ${PAGE} that matter are shown, faults first.`}
    </p>
  );
}

/** Paste what a receiver writes, and see field by field what it says and what is wrong. Nothing leaves this page. */
export default function SentenceReaderPage() {
  const [text, setText] = useState('');
  const [fileProblem, setFileProblem] = useState<string | null>(null);
  const deferred = useDeferredValue(text);
  const lines = useMemo(() => explainText(deferred), [deferred]);
  const shown = useMemo(
    () => lines.toSorted((a, b) => Number(a.problem === null) - Number(b.problem === null)).slice(0, PAGE),
    [lines],
  );
  const open = async (file: File | undefined) => {
    if (!file) return;
    setFileProblem(file.size > MOST_BYTES ? 'This file is over 5 MB. Take a part of it.' : null);
    if (file.size <= MOST_BYTES) setText(await file.text());
  };
  return (
    <>
      <div className="page-head">
        <h1>Sentence reader</h1>
      </div>
      <p>Paste sentences as the receiver writes them, or open a log. They stay on this computer.</p>
      <Field label="Sentences">
        <Textarea
          className="sentence-input"
          value={text}
          onChange={(_, { value }) => setText(value)}
          resize="vertical"
          textarea={{ spellCheck: false, rows: 6 }}
        />
      </Field>
      <div className="sentence-tools">
        <label className="sentence-file">
          Open a log
          <input
            type="file"
            accept=".nmea,.log,.txt,text/plain"
            onChange={(event) => void open(event.target.files?.[0])}
          />
        </label>
        <Button onClick={() => setText(example)}>Show an example</Button>
        {text !== '' && <Button onClick={() => setText('')}>Clear</Button>}
      </div>
      {fileProblem && <p role="alert">{fileProblem}</p>}
      {lines.length > 0 && <Summary lines={lines} />}
      <ol className="sentences">
        {(lines.length > PAGE ? shown : lines).map((line) => (
          <Line key={line.line} line={line} />
        ))}
      </ol>
    </>
  );
}
