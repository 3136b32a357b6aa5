import { causeLabels, confirmedCauses } from '@hubtack/contracts/lost-fixes/cause.js';
import { closeBody, type LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { ChoiceField, NoteField } from '../../components/form-fields';
import { FormSheet } from '../../components/form-sheet';
import { useClose } from '../../lib/lost-fixes';

/** A person confirms the cause; the likely one is chosen beforehand. It feeds the weekly report. */
export function CloseSheet({ lostFix, onClose }: { lostFix: LostFix; onClose: () => void }) {
  const close = useClose(lostFix.id);
  return (
    <FormSheet
      title="Close it"
      schema={closeBody}
      defaults={{ cause: lostFix.diagnosis?.cause ?? 'unclear', note: null }}
      button="Close it"
      save={close.mutateAsync}
      onDone={onClose}
      below={
        <>
          {lostFix.members > 0 && (
            <p>Closes those that hang under it as well, where nobody has closed them.</p>
          )}
          {lostFix.endAt === null && lostFix.kind !== 'flag' && (
            <p>The fix is lost still; its time goes on counting until it is back.</p>
          )}
        </>
      }
    >
      <ChoiceField
        name="cause"
        label="What was it?"
        required
        as="text"
        options={confirmedCauses.map((value) => ({ value, label: causeLabels[value] }))}
      />
      <NoteField name="note" label="Note" hint="What was done, or found. It stays with the lost fix." />
    </FormSheet>
  );
}
