import { Button } from '@fluentui/react-components';
import { firstThings } from '@hubtack/contracts/lost-fixes/cause.js';
import { adviceBody, type LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { useState, type KeyboardEvent } from 'react';
import { Form } from '../../components/form';
import { NoteField } from '../../components/form-fields';
import { TakeButton } from '../../components/take-button';
import { clockTime } from '../../lib/format';
import { useAdvise, useUnshelve } from '../../lib/lost-fixes';
import { useMe } from '../../lib/session';
import { CloseSheet } from './close-sheet';
import { HandOverSheet } from './hand-over-sheet';
import { ShelveSheet } from './shelve-sheet';

type Open = 'handOver' | 'shelve' | 'close' | null;

const sendByKeys = (event: KeyboardEvent<HTMLDivElement>) => {
  if (event.key !== 'Enter' || !(event.ctrlKey || event.metaKey)) return;
  (event.target as HTMLTextAreaElement).form?.requestSubmit();
};

/** What the office does about it: take, advise, hand over, shelve, close. */
export function AnswerPart({ lostFix }: { lostFix: LostFix }) {
  const { id, taken, shelved, diagnosis, kind, crewName } = lostFix;
  const { timeZone } = useMe();
  const advise = useAdvise(id);
  const unshelve = useUnshelve(id);
  const [open, setOpen] = useState<Open>(null);
  const [sent, setSent] = useState(0);
  const close = () => setOpen(null);
  const suggested = sent === 0 && diagnosis && kind !== 'flag' ? firstThings[diagnosis.cause] : '';
  return (
    <section aria-label="Answer" className="loss-answer">
      <div className="lost-fix-actions">
        {taken ? (
          <span>
            {taken.by} has it since {clockTime(taken.at, timeZone)}.
          </span>
        ) : (
          <TakeButton id={id} />
        )}
        <Button onClick={() => setOpen('handOver')}>Hand over</Button>
        {shelved ? (
          <Button disabled={unshelve.isPending} onClick={() => unshelve.mutate()}>
            Off the shelf
          </Button>
        ) : (
          <Button onClick={() => setOpen('shelve')}>Shelve</Button>
        )}
        <Button onClick={() => setOpen('close')}>Close it</Button>
      </div>
      {shelved && (
        <p>
          Shelved until {clockTime(shelved.until, timeZone)} by {shelved.by}: {shelved.reason}
        </p>
      )}
      <div onKeyDown={sendByKeys} role="presentation">
        <Form
          key={sent}
          schema={adviceBody}
          defaults={{ text: suggested }}
          button="Send advice"
          submit={async (body) => {
            await advise.mutateAsync(body);
            setSent((count) => count + 1);
          }}
        >
          <NoteField
            name="text"
            label="Advice"
            hint={`Reaches ${kind === 'mountPoint' ? 'the chiefs of all crews under it' : `the chief of ${crewName ?? 'the crew'}`} at once. Ctrl + Enter sends.`}
          />
        </Form>
        {sent > 0 && <p role="status">Sent.</p>}
      </div>
      {open === 'handOver' && <HandOverSheet lostFix={lostFix} onClose={close} />}
      {open === 'shelve' && <ShelveSheet id={id} onClose={close} />}
      {open === 'close' && <CloseSheet lostFix={lostFix} onClose={close} />}
    </section>
  );
}
