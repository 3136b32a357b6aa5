import { changeRoverBody, roverBody, type Rover } from '@hubtack/contracts/rovers/rover.js';
import { useQuery } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { Form } from '../../components/form';
import { ChoiceField, InUseField, TextField } from '../../components/form-fields';
import { FormSheet } from '../../components/form-sheet';
import { Sheet } from '../../components/sheet';
import { correctionSourcesQuery } from '../../lib/corrections';
import { useAddRover, useChangeRover } from '../../lib/rovers';

function Fields() {
  const { data: sources = [] } = useQuery(correctionSourcesQuery);
  const options = sources.map(({ id, name, mountPoint }) => ({
    value: id,
    label: `${mountPoint} (${name})`,
  }));
  return (
    <>
      <TextField name="label" label="Label" hint="As written on the pole, such as R-07" required />
      <TextField name="receiver" label="Receiver" />
      <TextField name="serial" label="Serial number" />
      <ChoiceField
        key={options.length}
        name="correctionSourceId"
        label="Correction source"
        options={options}
        none="Not set"
        as="number"
      />
    </>
  );
}

export function AddRover({ onDone }: { onDone: () => void }) {
  const add = useAddRover();
  const navigate = useNavigate();
  return (
    <Sheet title="Add a rover" onClose={onDone}>
      <Form
        schema={roverBody}
        defaults={{ label: '', receiver: null, serial: null, correctionSourceId: null }}
        button="Add the rover"
        onCancel={onDone}
        submit={async (body) => {
          const added = await add.mutateAsync(body);
          await navigate(`/rovers/${added.id}`);
        }}
      >
        <Fields />
      </Form>
    </Sheet>
  );
}

export function ChangeRover({ rover, onDone }: { rover: Rover; onDone: () => void }) {
  const change = useChangeRover(rover.id);
  const { label, receiver, serial, correctionSourceId, retired } = rover;
  return (
    <FormSheet
      title={`Change ${label}`}
      schema={changeRoverBody}
      defaults={{ label, receiver, serial, correctionSourceId, retired }}
      button="Save"
      save={change.mutateAsync}
      onDone={onDone}
    >
      <Fields />
      <InUseField name="retired" inUse={false} />
    </FormSheet>
  );
}
