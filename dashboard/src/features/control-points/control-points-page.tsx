import { Button } from '@fluentui/react-components';
import {
  changeControlPointBody,
  controlPointBody,
  type ControlPoint,
} from '@hubtack/contracts/control-points/control-point.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { DataTable } from '../../components/data-table';
import { ChoiceField, InUseField, NoteField, NumberField, TextField } from '../../components/form-fields';
import { FormSheet } from '../../components/form-sheet';
import { Link } from 'react-router-dom';
import { ImportLink } from '../../components/import-link';
import { ListPage } from '../../components/list-page';
import { Empty } from '../../components/query-states';
import { controlPointsQuery, useAddControlPoint, useChangeControlPoint } from '../../lib/control-points';

const heightKinds = [
  { value: 'ellipsoidal', label: 'above the ellipsoid' },
  { value: 'geoid', label: 'above the geoid' },
];

const Fields = () => (
  <>
    <TextField name="name" label="Name" required />
    <div className="form-row">
      <NumberField name="latitude" label="Latitude" hint="Degrees, south is negative" required />
      <NumberField name="longitude" label="Longitude" hint="Degrees, west is negative" required />
    </div>
    <div className="form-row">
      <NumberField name="height" label="Height" hint="Metres" />
      <ChoiceField name="heightKind" label="Height counts" options={heightKinds} as="text" />
    </div>
    <TextField name="datum" label="Datum" hint="Datum and epoch, in your words" />
    <NoteField name="note" label="Note" />
  </>
);

function AddControlPoint({ onDone }: { onDone: () => void }) {
  const add = useAddControlPoint();
  return (
    <FormSheet
      title="Add a control point"
      schema={controlPointBody}
      defaults={{ name: '', height: null, heightKind: 'ellipsoidal', datum: null, note: null }}
      button="Add the control point"
      save={add.mutateAsync}
      onDone={onDone}
    >
      <Fields />
    </FormSheet>
  );
}

function ChangeControlPoint({ point, onDone }: { point: ControlPoint; onDone: () => void }) {
  const { id, ...defaults } = point;
  const change = useChangeControlPoint(id);
  return (
    <FormSheet
      title={`Change ${point.name}`}
      schema={changeControlPointBody}
      defaults={defaults}
      button="Save"
      save={change.mutateAsync}
      onDone={onDone}
    >
      <Fields />
      <InUseField name="active" inUse />
    </FormSheet>
  );
}

/** Marks whose position is known, to check rovers against. */
export default function ControlPointsPage() {
  const query = useQuery(controlPointsQuery);
  const [open, setOpen] = useState<ControlPoint | 'new' | null>(null);
  const close = () => setOpen(null);
  return (
    <ListPage
      title="Control points"
      what="the control points"
      query={query}
      action={
        <div className="page-actions">
          <Link to="/check-shots">Checks of a day</Link>
          <ImportLink kind="control-points" />
          <Button appearance="primary" onClick={() => setOpen('new')}>
            Add a control point
          </Button>
        </div>
      }
    >
      {(points) => (
        <>
          <p>
            Coordinates are kept as they are written here; nothing is transformed. Take them from the register
            or the licensed surveyor in charge.
          </p>
          {points.length === 0 ? (
            <Empty title="No control point yet">
              Add the marks that crews check into before they measure, or import them from a spreadsheet.
            </Empty>
          ) : (
            <DataTable
              label="Control points"
              rows={points}
              rowKey={({ id }) => id}
              isFaded={({ active }) => !active}
              columns={[
                { name: 'Control point', cell: ({ name }) => <strong>{name}</strong> },
                { name: 'Latitude', figure: true, cell: ({ latitude }) => latitude.toFixed(8) },
                { name: 'Longitude', figure: true, cell: ({ longitude }) => longitude.toFixed(8) },
                {
                  name: 'Height',
                  figure: true,
                  cell: ({ height }) => (height === null ? '–' : `${height.toFixed(3)} m`),
                },
                {
                  name: 'Height counts',
                  cell: (point) => heightKinds.find(({ value }) => value === point.heightKind)?.label,
                },
                { name: 'Datum', cell: ({ datum }) => datum ?? '' },
                { name: 'Note', cell: ({ note }) => note ?? '' },
                { name: 'In use', cell: ({ active }) => (active ? 'yes' : 'put away') },
                {
                  name: 'Change',
                  cell: (point) => (
                    <Button size="small" onClick={() => setOpen(point)} aria-label={`Change ${point.name}`}>
                      Change
                    </Button>
                  ),
                },
              ]}
            />
          )}
          {open === 'new' && <AddControlPoint onDone={close} />}
          {open !== null && open !== 'new' && <ChangeControlPoint point={open} onDone={close} />}
        </>
      )}
    </ListPage>
  );
}
