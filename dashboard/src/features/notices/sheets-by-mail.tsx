import { MessageBar, MessageBarBody, Switch } from '@fluentui/react-components';
import type { SheetKind, SubscriptionList } from '@hubtack/contracts/sheets/subscription.js';
import { useQuery } from '@tanstack/react-query';
import { Failed, Loading } from '../../components/query-states';
import { subscriptionsQuery, useChangeSubscriptions } from '../../lib/subscriptions';

const names: Record<SheetKind, string> = {
  weekly: 'The week before, on Monday',
  daily: 'My crew’s day, after the shift',
};

/** What comes by mail without anything having gone wrong: everything off until it is switched on. */
export function SheetsByMail() {
  const { data, error, refetch } = useQuery(subscriptionsQuery);
  return (
    <section className="device-ways" aria-label="Sheets by mail">
      <h2>Sheets by mail</h2>
      {data ? (
        <Sheets list={data} />
      ) : error ? (
        <Failed error={error} retry={() => void refetch()} />
      ) : (
        <Loading what="your sheets" />
      )}
    </section>
  );
}

function Sheets({ list }: { list: SubscriptionList }) {
  const change = useChangeSubscriptions();
  const set = (sheet: SheetKind, isOn: boolean) => {
    const others = list.sheets.filter((one) => one.isOn && one.sheet !== sheet).map((one) => one.sheet);
    change.mutate(isOn ? [...others, sheet] : others);
  };
  return (
    <>
      {list.sheets.map(({ sheet, isOn }) => (
        <div key={sheet} className="sheet-switch">
          <Switch
            label={names[sheet]}
            aria-describedby={`sheet-${sheet}`}
            checked={isOn}
            disabled={change.isPending}
            onChange={(_, { checked }) => set(sheet, checked)}
          />
          <p id={`sheet-${sheet}`}>{whenWords(sheet, list)}</p>
        </div>
      ))}
      {!list.isMailSet && (
        <p role="status">This server has no mail server set, so nothing is sent yet. Your choice is kept.</p>
      )}
      {change.error && (
        <MessageBar intent="error">
          <MessageBarBody>{change.error.message}</MessageBarBody>
        </MessageBar>
      )}
      {change.isSuccess && <p role="status">Saved.</p>}
    </>
  );
}

function whenWords(sheet: SheetKind, { weeklyMailHour, timeZone }: SubscriptionList): string {
  if (sheet === 'daily')
    return 'A quarter of an hour after the last shift of the day: time with a fix, what was lost and why, what waits to be closed.';
  const hour = `${String(weeklyMailHour).padStart(2, '0')}:00`;
  return `Mondays at ${hour} (${timeZone}): fix uptime, crews, causes. Switched on after that hour and before Thursday, it comes within a minute or two.`;
}
