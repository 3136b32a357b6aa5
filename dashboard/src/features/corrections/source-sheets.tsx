import {
  correctionSourceBody,
  type CorrectionSource,
  type CorrectionSourceBody,
} from '@hubtack/contracts/corrections/correction-source.js';
import { useNavigate } from 'react-router-dom';
import { Form } from '../../components/form';
import { FormSheet } from '../../components/form-sheet';
import { Sheet } from '../../components/sheet';
import { useAddCorrectionSource, useChangeCorrectionSource } from '../../lib/corrections';
import { bodyOf } from './source-body';
import { SourceFields } from './source-fields';

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

/** A new source is looked at next: its page has the check. */
export function AddSource({ onDone }: { onDone: () => void }) {
  const add = useAddCorrectionSource();
  const navigate = useNavigate();
  return (
    <Sheet title="Add a correction source" onClose={onDone}>
      <Form
        schema={correctionSourceBody}
        defaults={blank}
        button="Add it"
        onCancel={onDone}
        submit={async (body) => {
          const added = await add.mutateAsync(body);
          await navigate(`/corrections/${added.id}`);
        }}
      >
        <SourceFields source={null} />
      </Form>
    </Sheet>
  );
}

export function ChangeSource({ source, onDone }: { source: CorrectionSource; onDone: () => void }) {
  const change = useChangeCorrectionSource(source.id);
  return (
    <FormSheet
      title={`Change ${source.name}`}
      schema={correctionSourceBody}
      defaults={bodyOf(source)}
      button="Save"
      save={change.mutateAsync}
      onDone={onDone}
    >
      <SourceFields source={source} />
    </FormSheet>
  );
}
