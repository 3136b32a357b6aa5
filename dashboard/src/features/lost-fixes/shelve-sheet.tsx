import { shelveBody } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { NumberField, TextField } from '../../components/form-fields';
import { FormSheet } from '../../components/form-sheet';
import { useShelve } from '../../lib/lost-fixes';

/** Silent for a time, with a reason; everybody sees who did it, and it comes back by itself. */
export function ShelveSheet({ id, onClose }: { id: number; onClose: () => void }) {
  const shelve = useShelve(id);
  return (
    <FormSheet
      title="Shelve"
      schema={shelveBody}
      defaults={{ minutes: 30, reason: '' }}
      button="Shelve"
      save={shelve.mutateAsync}
      onDone={onClose}
      below={<p>No notice of it until then. It stays on the desk, and its time goes on counting.</p>}
    >
      <NumberField name="minutes" label="Minutes" required />
      <TextField name="reason" label="Reason" required />
    </FormSheet>
  );
}
