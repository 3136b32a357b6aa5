import { Button } from '@fluentui/react-components';
import {
  correctionSourceBody,
  type CorrectionSource,
  type CorrectionSourceBody,
} from '@hubtack/contracts/corrections/correction-source.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useFormContext } from 'react-hook-form';
import { DataTable } from '../../components/data-table';
import { NumberField, TextField } from '../../components/form-fields';
import { FormSheet } from '../../components/form-sheet';
import { ListPage } from '../../components/list-page';
import { Empty } from '../../components/query-states';
import {
  correctionSourcesQuery,
  useAddCorrectionSource,
  useChangeCorrectionSource,
} from '../../lib/corrections';
import { useMe } from '../../lib/session';
import { typingFaults } from '@hubtack/contracts/corrections/typing-faults.js';

/** What looks mistyped, said while it is typed. It does not stop anybody: some names really are like that. */
function Fields() {
  const { watch } = useFormContext();
  const [address, port, mountPoint] = watch(['address', 'port', 'mountPoint']) as (string | number | null)[];
  const faults = typingFaults({ address: `${address ?? ''}`, port, mountPoint: `${mountPoint ?? ''}` });
  const hint = (field: string) =>
    faults
      .filter((fault) => fault.field === field)
      .map(({ words }) => `Look again: it ${words}.`)
      .join(' ') || undefined;
  return (
    <>
      <TextField name="name" label="Name" required />
      <div className="form-row">
        <TextField name="address" label="Address" hint={hint('address')} autoComplete="off" required />
        <NumberField name="port" label="Port" hint={hint('port')?.replace('it 2101', '2101')} required />
      </div>
      <TextField
        name="mountPoint"
        label="Mount point"
        hint={hint('mountPoint')}
        autoComplete="off"
        required
      />
      <div className="form-row">
        <NumberField name="baseLatitude" label="Base latitude" hint="Empty when not known" />
        <NumberField name="baseLongitude" label="Base longitude" hint="Empty for a virtual base" />
      </div>
    </>
  );
}

interface SourceSheetProps {
  title: string;
  source: CorrectionSourceBody;
  button: string;
  save: (body: CorrectionSourceBody) => Promise<unknown>;
  onDone: () => void;
}

function SourceSheet({ title, source, button, save, onDone }: SourceSheetProps) {
  return (
    <FormSheet
      title={title}
      schema={correctionSourceBody}
      defaults={source}
      button={button}
      save={save}
      onDone={onDone}
    >
      <Fields />
    </FormSheet>
  );
}

const blank: CorrectionSourceBody = {
  name: '',
  address: '',
  port: 2101,
  mountPoint: '',
  user: null,
  ntripVersion: 2,
  tls: false,
  sendPosition: false,
  expectedFormat: 'any',
  watchMinutes: null,
  baseLatitude: null,
  baseLongitude: null,
};

function AddSource({ onDone }: { onDone: () => void }) {
  const add = useAddCorrectionSource();
  const save = add.mutateAsync;
  return (
    <SourceSheet title="Add a correction source" source={blank} button="Add it" save={save} onDone={onDone} />
  );
}

function ChangeSource({ source, onDone }: { source: CorrectionSource; onDone: () => void }) {
  const change = useChangeCorrectionSource(source.id);
  const { id: _id, ...body } = source;
  const title = `Change ${source.name}`;
  return <SourceSheet title={title} source={body} button="Save" save={change.mutateAsync} onDone={onDone} />;
}

const placeWords = ({ baseLatitude, baseLongitude }: CorrectionSource) =>
  baseLatitude === null || baseLongitude === null
    ? 'not known'
    : `${baseLatitude.toFixed(4)}, ${baseLongitude.toFixed(4)}`;

export default function CorrectionsPage() {
  const query = useQuery(correctionSourcesQuery);
  const { role } = useMe();
  const [open, setOpen] = useState<CorrectionSource | 'new' | null>(null);
  const mayChange = role === 'technician' || role === 'manager';
  const close = () => setOpen(null);
  return (
    <ListPage
      title="Correction sources"
      what="the correction sources"
      query={query}
      action={
        mayChange && (
          <Button appearance="primary" onClick={() => setOpen('new')}>
            Add a source
          </Button>
        )
      }
    >
      {(sources) => (
        <>
          {sources.length === 0 ? (
            <Empty title="No correction source yet">
              Add the base stations and networks that your rovers use, so that the board can name them and say
              how far they are.
            </Empty>
          ) : (
            <DataTable
              label="Correction sources"
              rows={sources}
              rowKey={({ id }) => id}
              columns={[
                { name: 'Source', cell: (source) => <strong>{source.name}</strong> },
                { name: 'Mount point', cell: (source) => source.mountPoint },
                { name: 'Address', cell: (source) => source.address },
                { name: 'Port', figure: true, cell: (source) => source.port },
                { name: 'Base position', cell: placeWords },
                {
                  name: 'Change',
                  cell: (source) =>
                    mayChange && (
                      <Button
                        size="small"
                        onClick={() => setOpen(source)}
                        aria-label={`Change ${source.name}`}
                      >
                        Change
                      </Button>
                    ),
                },
              ]}
            />
          )}
          {open === 'new' && <AddSource onDone={close} />}
          {open !== null && open !== 'new' && <ChangeSource source={open} onDone={close} />}
        </>
      )}
    </ListPage>
  );
}
