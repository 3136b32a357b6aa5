import { Button } from '@fluentui/react-components';
import { useTake } from '../lib/lost-fixes';

/** Taking what somebody took a moment before says who has it. */
export function TakeButton({ id }: { id: number }) {
  const take = useTake(id);
  return (
    <>
      <Button size="small" disabled={take.isPending} onClick={() => take.mutate()}>
        Take it
      </Button>
      {take.error && <span role="alert">{take.error.message}</span>}
    </>
  );
}
