import { shelveBody } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { Form } from '../../components/form';
import { NumberField, TextField } from '../../components/form-fields';
import { Sheet } from '../../components/sheet';
import { useShelve } from '../../lib/lost-fixes';

/** Silent for a time, with a reason; everybody sees who did it, and it comes back by itself. */
export function ShelveSheet({ id, onClose }: { id: number; onClose: () => void }) {
  const shelve = useShelve(id);
  return (
    <Sheet title="Shelve" onClose={onClose}>
      <Form
        schema={shelveBody}
        defaults={{ minutes: 30, reason: '' }}
        button="Shelve"
        onCancel={onClose}
        submit={async (body) => {
          await shelve.mutateAsync(body);
          onClose();
        }}
      >
        <NumberField name="minutes" label="Minutes" required />
        <TextField name="reason" label="Reason" required />
      </Form>
      <p>No notice of it until then. It stays on the desk, and its time goes on counting.</p>
    </Sheet>
  );
}
