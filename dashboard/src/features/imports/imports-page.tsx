import { Button, Field, MessageBar, MessageBarBody, Select, Textarea } from '@fluentui/react-components';
import {
  importColumns,
  importKind,
  MOST_CHARACTERS,
  MOST_ROWS,
  type ImportKind,
} from '@hubtack/contracts/imports/import.js';
import { useState } from 'react';
import { Link, Navigate, useNavigate, useParams } from 'react-router-dom';
import { Loading } from '../../components/query-states';
import { useImport, usePreviewImport } from '../../lib/imports';
import { ImportPreviewPart } from './import-preview';
import { decodeList } from './list-file';
import './imports.css';

const names: Record<ImportKind, string> = {
  crews: 'Crews',
  sites: 'Sites',
  'control-points': 'Control points',
};
const examples: Record<ImportKind, string> = {
  crews: 'Alder,0491 570 156,Quarry road,95,Mon-Fri,07:00,15:30',
  sites: 'Quarry road,-35.1234,149.1234,Ring at the gate',
  'control-points': 'M-12,-35.12345678,149.12345678,512.345,ellipsoidal,Local datum 2020,Steel pin in kerb',
};

/** A list out of a spreadsheet: what it will do is shown first, and it is done whole or not at all. */
export default function ImportsPage() {
  const kind = importKind.safeParse(useParams()['kind']);
  // A new list begins with each kind.
  return kind.success ? <ImportList key={kind.data} kind={kind.data} /> : <Navigate to="/" replace />;
}

function ImportList({ kind }: { kind: ImportKind }) {
  const navigate = useNavigate();
  const [text, setText] = useState('');
  const [encoding, setEncoding] = useState<string | null>(null);
  const preview = usePreviewImport(kind);
  const doing = useImport(kind);
  const isTooLong = text.length > MOST_CHARACTERS;

  const take = (next: string, from: string | null) => {
    setText(next);
    setEncoding(from);
    doing.reset();
    preview.reset();
  };
  const open = async (file: File | undefined) => {
    if (!file) return;
    const decoded = decodeList(new Uint8Array(await file.arrayBuffer()));
    take(decoded.text, decoded.encoding);
    if (decoded.text.length <= MOST_CHARACTERS) preview.mutate(decoded.text);
  };
  const error = doing.error ?? preview.error;

  return (
    <>
      <div className="page-head">
        <h1>Import a list</h1>
      </div>
      <div className="import-choice">
        <Field label="A list of">
          <Select value={kind} onChange={(_, { value }) => void navigate(`/imports/${value}`)}>
            {importKind.options.map((one) => (
              <option key={one} value={one}>
                {names[one]}
              </option>
            ))}
          </Select>
        </Field>
        <label className="import-file">
          Open a CSV file
          <input
            type="file"
            accept=".csv,.tsv,.txt,text/csv,text/plain"
            onChange={(event) => {
              void open(event.target.files?.[0]);
              // So that the same file can be chosen again once it is mended.
              event.target.value = '';
            }}
          />
        </label>
      </div>
      <p>
        The first row names the columns, in any order; only <strong>name</strong> must be there. A row whose
        name is known changes that entry, and an empty cell leaves what is there. Nothing is written before
        you have seen what will happen. At most {MOST_ROWS} rows.
      </p>
      <pre className="import-example" tabIndex={0} aria-label="An example">
        {importColumns[kind].join(',')}
        {'\n'}
        {examples[kind]}
      </pre>
      <Field
        label="Or paste the rows"
        {...(isTooLong
          ? {
              validationState: 'error' as const,
              validationMessage: `This list is too long: at most ${MOST_ROWS} rows. Split it.`,
            }
          : {})}
        {...(encoding ? { hint: `Read as ${encoding}. Look whether names with accents are right.` } : {})}
      >
        <Textarea
          value={isTooLong ? text.slice(0, 2000) : text}
          onChange={(_, { value }) => take(value, null)}
          resize="vertical"
          textarea={{ rows: 5, spellCheck: false }}
        />
      </Field>
      {!preview.data && (
        <div className="form-buttons">
          <Button
            disabled={text.trim() === '' || isTooLong || preview.isPending}
            onClick={() => preview.mutate(text)}
          >
            Show what will happen
          </Button>
        </div>
      )}
      {preview.isPending && <Loading what="what will happen" />}
      {error && (
        <MessageBar intent="error" className="import-message">
          <MessageBarBody>{error.message}</MessageBarBody>
        </MessageBar>
      )}
      {doing.data ? (
        <MessageBar intent="success" className="import-message">
          <MessageBarBody>
            Imported: {doing.data.added} new, {doing.data.changed} changed.{' '}
            <Link to={`/${kind}`}>See the list</Link>
          </MessageBarBody>
        </MessageBar>
      ) : (
        preview.data && (
          <ImportPreviewPart
            preview={preview.data}
            isPending={doing.isPending}
            onImport={() => doing.mutate({ text, fingerprint: preview.data.fingerprint })}
          />
        )
      )}
    </>
  );
}
