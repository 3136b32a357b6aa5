import { handOverBody, type LostFix } from '@hubtack/contracts/lost-fixes/lost-fix.js';
import { useQuery } from '@tanstack/react-query';
import { Form } from '../../components/form';
import { ChoiceField } from '../../components/form-fields';
import { Failed, Loading } from '../../components/query-states';
import { Sheet } from '../../components/sheet';
import { peopleQuery, useHandOver } from '../../lib/lost-fixes';

/** Somebody else of the office has it from now on. */
export function HandOverSheet({ lostFix, onClose }: { lostFix: LostFix; onClose: () => void }) {
  const { data, error, refetch } = useQuery(peopleQuery);
  const handOver = useHandOver(lostFix.id);
  const others = data?.filter(({ id }) => id !== lostFix.taken?.userId) ?? [];
  return (
    <Sheet title="Hand over" onClose={onClose}>
      {error && <Failed error={error} retry={() => void refetch()} />}
      {!data && !error && <Loading what="the people" />}
      {data && (
        <Form
          schema={handOverBody}
          defaults={{ userId: others[0]?.id ?? 0 }}
          button="Hand over"
          onCancel={onClose}
          submit={async (body) => {
            await handOver.mutateAsync(body);
            onClose();
          }}
        >
          <ChoiceField
            name="userId"
            label="To"
            required
            as="number"
            options={others.map(({ id, name }) => ({ value: id, label: name }))}
          />
        </Form>
      )}
    </Sheet>
  );
}
