import { settings, type Settings } from '@hubtack/contracts/settings/settings.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Form } from '../../components/form';
import { ChoiceField, TextField } from '../../components/form-fields';
import { ListPage } from '../../components/list-page';
import { settingsQuery, useChangeSettings } from '../../lib/settings';

function SettingsForm({ current }: { current: Settings }) {
  const change = useChangeSettings();
  const [isSaved, setIsSaved] = useState(false);
  return (
    <div className="page-narrow">
      <Form
        schema={settings}
        defaults={current}
        button="Save"
        submit={async (body) => {
          setIsSaved(false);
          await change.mutateAsync(body);
          setIsSaved(true);
        }}
      >
        <TextField name="firmName" label="Firm" required />
        <TextField
          name="timeZone"
          label="Time zone"
          hint="A name of the IANA time zone database. It decides when a day and a week begin, and when patterns apply."
          required
        />
        <ChoiceField
          name="units"
          label="Units"
          options={[
            { value: 'metric', label: 'Metres and kilometres' },
            { value: 'feet', label: 'Feet and miles' },
          ]}
        />
        <TextField
          name="currency"
          label="Currency"
          hint="Three letters of ISO 4217, for hourly rates"
          required
        />
        <ChoiceField
          name="keepPositionsOffShift"
          label="Positions outside on-shift time"
          as="flag"
          hint="Where people were outside paid time is personal data in many places. Ask whoever is responsible for it before keeping it, and tell the crews."
          options={[
            { value: 'false', label: 'Drop them after the day' },
            { value: 'true', label: 'Keep them as long as raw epochs' },
          ]}
        />
      </Form>
      {isSaved && <p role="status">Saved.</p>}
    </div>
  );
}

export default function SettingsPage() {
  const query = useQuery(settingsQuery);
  return (
    <ListPage title="Settings" what="the settings" query={query}>
      {(current) => <SettingsForm current={current} />}
    </ListPage>
  );
}
