import { Button } from '@fluentui/react-components';
import { changeCrewBody, crewBody, type Crew } from '@hubtack/contracts/crews/crew.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { DataTable } from '../../components/data-table';
import { ChoiceField, InUseField, NumberField, TextField } from '../../components/form-fields';
import { FormSheet } from '../../components/form-sheet';
import { ImportLink } from '../../components/import-link';
import { ListPage } from '../../components/list-page';
import { Empty } from '../../components/query-states';
import { crewsQuery, useAddCrew, useChangeCrew } from '../../lib/crews';
import { useMe } from '../../lib/session';
import { settingsQuery } from '../../lib/settings';
import { sitesQuery } from '../../lib/sites';
import { CrewToday } from './crew-today';
import { PatternFields } from '../../components/pattern-fields';
import { weekdays } from '../../lib/weekdays';

function Fields() {
  const { data: sites = [] } = useQuery(sitesQuery);
  const { data: settings } = useQuery(settingsQuery);
  const { role } = useMe();
  const profiles = settings?.otherProfiles ?? [];
  const options = sites.filter(({ active }) => active).map(({ id, name }) => ({ value: id, label: name }));
  return (
    <>
      <TextField name="name" label="Name" required />
      <TextField name="phone" label="Telephone" hint="Whom the office calls when the rover goes quiet" />
      {/* The choices must be there before the form chooses among them. */}
      <ChoiceField
        key={options.length}
        name="siteId"
        label="Site"
        options={options}
        none="No site"
        as="number"
      />
      {role === 'manager' && (
        <NumberField
          name="hourlyRate"
          label={`Hourly rate, ${settings?.currency ?? ''}`}
          hint="Only managers see it"
        />
      )}
      <ChoiceField
        key={`profiles ${profiles.length}`}
        name="toleranceProfile"
        label="Tolerance profile"
        hint="What the time of its rovers is judged by in the weekly figures"
        options={profiles.map(({ name }) => ({ value: name, label: name }))}
        none={`The firm’s${settings ? `: ${settings.toleranceProfile.name}` : ''}`}
      />
      <PatternFields />
    </>
  );
}

function AddCrew({ onDone }: { onDone: () => void }) {
  const add = useAddCrew();
  const { data: settings } = useQuery(settingsQuery);
  if (!settings) return null;
  const pattern = settings.workingWeek;
  return (
    <FormSheet
      title="Add a crew"
      schema={crewBody}
      defaults={{ name: '', phone: null, siteId: null, hourlyRate: null, pattern, toleranceProfile: null }}
      button="Add the crew"
      save={add.mutateAsync}
      onDone={onDone}
    >
      <Fields />
    </FormSheet>
  );
}

function ChangeCrew({ crew, onDone }: { crew: Crew; onDone: () => void }) {
  const change = useChangeCrew(crew.id);
  const { name, phone, siteId, hourlyRate, pattern, toleranceProfile, active } = crew;
  return (
    <FormSheet
      title={`Change ${name}`}
      schema={changeCrewBody}
      defaults={{ name, phone, siteId, hourlyRate, pattern, toleranceProfile, active }}
      button="Save"
      save={change.mutateAsync}
      onDone={onDone}
    >
      <Fields />
      <InUseField name="active" inUse />
    </FormSheet>
  );
}

/** Days with the same hours in one line: Mon–Fri 07:00–15:30. */
function patternWords(pattern: Crew['pattern']): string {
  const sorted = pattern.toSorted((a, b) => a.weekday - b.weekday);
  const groups: { first: number; last: number; hours: string }[] = [];
  for (const { weekday, start, end } of sorted) {
    const hours = `${start}–${end}`;
    const group = groups.at(-1);
    if (group && group.hours === hours && group.last === weekday - 1) group.last = weekday;
    else groups.push({ first: weekday, last: weekday, hours });
  }
  const day = (weekday: number) => weekdays[weekday - 1]!.slice(0, 3);
  return groups
    .map(({ first, last, hours }) => `${first === last ? day(first) : `${day(first)}–${day(last)}`} ${hours}`)
    .join(', ');
}

export default function CrewsPage() {
  const query = useQuery(crewsQuery);
  const { role } = useMe();
  const [open, setOpen] = useState<Crew | 'new' | null>(null);
  const [todayOf, setTodayOf] = useState<Crew | null>(null);
  const mayChange = role !== 'crewChief';
  const close = () => setOpen(null);
  return (
    <ListPage
      title="Crews"
      what="the crews"
      query={query}
      action={
        mayChange && (
          <div className="page-actions">
            <ImportLink kind="crews" />
            <Button appearance="primary" onClick={() => setOpen('new')}>
              Add a crew
            </Button>
          </div>
        )
      }
    >
      {(crews) => (
        <>
          {crews.length === 0 ? (
            <Empty title="No crew yet">Add a crew, then give it a rover on the Rovers page.</Empty>
          ) : (
            <DataTable
              label="Crews"
              rows={crews}
              rowKey={({ id }) => id}
              isFaded={({ active }) => !active}
              columns={[
                { name: 'Crew', cell: (crew) => <strong>{crew.name}</strong> },
                { name: 'Rovers', cell: (crew) => crew.rovers.map(({ label }) => label).join(', ') || '–' },
                { name: 'Site', cell: (crew) => crew.siteName ?? '–' },
                { name: 'Telephone', cell: (crew) => crew.phone ?? '–' },
                { name: 'Weekly pattern', cell: (crew) => patternWords(crew.pattern) || 'none' },
                ...(role === 'manager'
                  ? [
                      {
                        name: 'Hourly rate',
                        figure: true,
                        cell: (crew: Crew) => crew.hourlyRate?.toFixed(2) ?? '–',
                      },
                    ]
                  : []),
                { name: 'In use', cell: (crew) => (crew.active ? 'yes' : 'put away') },
                {
                  name: 'Today',
                  cell: (crew) => (
                    <Button
                      size="small"
                      onClick={() => setTodayOf(crew)}
                      aria-label={`Today of ${crew.name}`}
                    >
                      Today
                    </Button>
                  ),
                },
                {
                  name: 'Change',
                  cell: (crew) =>
                    mayChange && (
                      <Button size="small" onClick={() => setOpen(crew)} aria-label={`Change ${crew.name}`}>
                        Change
                      </Button>
                    ),
                },
              ]}
            />
          )}
          {todayOf && <CrewToday crew={todayOf} onClose={() => setTodayOf(null)} />}
          {open === 'new' && <AddCrew onDone={close} />}
          {open !== null && open !== 'new' && <ChangeCrew crew={open} onDone={close} />}
        </>
      )}
    </ListPage>
  );
}
