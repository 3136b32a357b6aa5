import { Button, MessageBar, MessageBarBody } from '@fluentui/react-components';
import type { ImportPreview, ImportRow } from '@hubtack/contracts/imports/import.js';
import { DataTable } from '../../components/data-table';

/** Rows shown at once, the wrong ones first; the counts are of all. */
const PAGE = 200;
const ORDER = ['wrong', 'change', 'add', 'same'] as const;
const words: Record<ImportRow['action'], string> = {
  wrong: 'wrong',
  change: 'changes',
  add: 'new',
  same: 'stays as it is',
};

const whatHappens = ({ errors, changes }: ImportRow): string =>
  [
    ...errors.map(({ column, detail }) => `${column}: ${detail}`),
    ...changes.map(({ column, before, after }) => `${column}: ${before || 'nothing'} becomes ${after}`),
  ].join('. ');

interface Props {
  preview: ImportPreview;
  isPending: boolean;
  onImport: () => void;
}

/** What a list would do, before anything is done. */
export function ImportPreviewPart({ preview: { rows }, isPending, onImport }: Props) {
  const count = (action: ImportRow['action']) => rows.filter((row) => row.action === action).length;
  const wrong = count('wrong');
  const toDo = count('add') + count('change');
  const shown = rows.toSorted((a, b) => ORDER.indexOf(a.action) - ORDER.indexOf(b.action)).slice(0, PAGE);
  return (
    <section className="page-section" aria-label="What will happen">
      <h2>What will happen</h2>
      <p role="status">
        {rows.length} {rows.length === 1 ? 'row' : 'rows'}: {count('add')} new, {count('change')} changed,{' '}
        {count('same')} as they are, {wrong} wrong.
        {rows.length > PAGE && ` The first ${PAGE} are shown, wrong ones first.`}
      </p>
      {wrong > 0 && (
        <MessageBar intent="error">
          <MessageBarBody>
            Nothing can be imported while a row is wrong. Mend the list and choose it again.
          </MessageBarBody>
        </MessageBar>
      )}
      <DataTable
        label="Rows of the list"
        rows={shown}
        rowKey={({ row }) => row}
        isFaded={({ action }) => action === 'same'}
        columns={[
          { name: 'Row', cell: ({ row }) => row },
          { name: 'Name', cell: ({ name }) => <strong>{name || '–'}</strong> },
          { name: 'Will be', cell: ({ action }) => words[action] },
          { name: 'What', cell: whatHappens },
        ]}
      />
      <div className="form-buttons import-go">
        <Button
          appearance="primary"
          size="large"
          disabled={wrong > 0 || toDo === 0 || isPending}
          onClick={onImport}
        >
          {toDo === 0 ? 'Nothing to import' : `Import ${toDo} ${toDo === 1 ? 'row' : 'rows'}`}
        </Button>
      </div>
    </section>
  );
}
