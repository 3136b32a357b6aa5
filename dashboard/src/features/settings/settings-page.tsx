import { settings, type ShownSettings } from '@hubtack/contracts/settings/settings.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Form } from '../../components/form';
import { ChoiceField, NumberField, TextField } from '../../components/form-fields';
import { ListPage } from '../../components/list-page';
import { HolidaysPart } from './holidays-part';
import { PreviewPart } from './preview-part';
import { OtherProfiles, ProfileFields } from './profile-fields';
import './settings.css';
import { PatternFields } from '../../components/pattern-fields';
import { settingsQuery, useChangeSettings } from '../../lib/settings';

const limitFields = [
  ['lostAfterSeconds', 'A lost fix counts after, s', 'And is raised then'],
  ['regainedAfterSeconds', 'A fix counts again after, s', 'A shorter fixed run is none'],
  ['firstFixWithinMinutes', 'First fix within, min', 'Of the first report of the shift'],
  ['heardWithinMinutes', 'Heard within, min', 'Of the beginning of the shift'],
  ['maxAgeSeconds', 'Corrections stopped from an age of, s', undefined],
  ['ageClearsSeconds', 'Corrections again under an age of, s', 'A margin, so that one outage stays one'],
  ['minSatellites', 'Fewest satellites', 'Fewer count as a blocked sky'],
  ['maxHdop', 'Highest HDOP', undefined],
  ['maxBaselineKm', 'Longest distance to the base, km', undefined],
] as const;

/** When a lost fix is raised, and what it is explained by. */
function LimitFields() {
  return (
    <fieldset className="limits">
      <legend>Limits of lost fixes</legend>
      <p>
        Usual values differ from place to place and from receiver to receiver. A change counts from the next
        look on, for the shifts of today.
      </p>
      {limitFields.map(([name, label, hint]) => (
        <NumberField key={name} name={`limits.${name}`} label={label} hint={hint} required />
      ))}
    </fieldset>
  );
}

/** When a fix counts as within tolerance in the weekly figures. */
function ToleranceFields() {
  return (
    <fieldset className="limits">
      <legend>Tolerance profile</legend>
      <p>
        Fixed time counts as within tolerance while all of these hold. This one counts for every crew that has
        none of its own.
      </p>
      <ProfileFields name="toleranceProfile" />
    </fieldset>
  );
}

/** When a check shot passes, and when another is due. Stored in metres, said in metres: a form does not convert. */
function CheckShotFields() {
  return (
    <fieldset className="limits">
      <legend>Check shots</legend>
      <p>
        What a check on a control point may differ by. The licensed surveyor in charge, and local rules,
        decide what is acceptable.
      </p>
      <NumberField name="checkShotLimits.horizontalM" label="In plan to, m" required />
      <NumberField name="checkShotLimits.verticalM" label="In height to, m" required />
      <NumberField
        name="checkShotLimits.againAfterLostMinutes"
        label="Check again after a lost fix of, min"
        required
      />
    </fieldset>
  );
}

function SettingsForm({ current }: { current: ShownSettings }) {
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
        <PatternFields
          name="workingWeek"
          legend="Working week"
          hint="What a new crew begins with, one by one or imported. Crews that are there keep their own pattern."
        />
        <LimitFields />
        <ToleranceFields />
        <OtherProfiles />
        <CheckShotFields />
        <PreviewPart />
        <NumberField
          name="weeklyMailHour"
          label="Hour of Monday at which the week goes out by mail"
          hint="0 to 23, local time. People switch it on for themselves under Notices."
          required
        />
      </Form>
      {isSaved && <p role="status">Saved.</p>}
      <h2>What is kept</h2>
      <p>
        Single positions are kept for {current.rawEpochDays} days and dropped then; time by state, lost fixes
        and the figures of every week stay. A changed tolerance profile counts for as far back as single
        positions go. Whoever runs the server sets the days (RAW_EPOCH_DAYS).
      </p>
    </div>
  );
}

export default function SettingsPage() {
  const query = useQuery(settingsQuery);
  return (
    <ListPage title="Settings" what="the settings" query={query}>
      {(current) => (
        <>
          <SettingsForm current={current} />
          <HolidaysPart />
        </>
      )}
    </ListPage>
  );
}
