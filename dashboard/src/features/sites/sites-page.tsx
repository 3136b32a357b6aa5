import { Button } from '@fluentui/react-components';
import { changeSiteBody, siteBody, type Site } from '@hubtack/contracts/sites/site.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { DataTable } from '../../components/data-table';
import { InUseField, NoteField, NumberField, TextField } from '../../components/form-fields';
import { FormSheet } from '../../components/form-sheet';
import { Link } from 'react-router-dom';
import { ImportLink } from '../../components/import-link';
import { ListPage } from '../../components/list-page';
import { Empty } from '../../components/query-states';
import { useMe } from '../../lib/session';
import { sitesQuery, useAddSite, useChangeSite } from '../../lib/sites';

const Fields = () => (
  <>
    <TextField name="name" label="Name" required />
    <div className="form-row">
      <NumberField name="latitude" label="Latitude" hint="Degrees, south is negative" />
      <NumberField name="longitude" label="Longitude" hint="Degrees, west is negative" />
    </div>
    <NoteField name="note" label="Note" />
  </>
);

function AddSite({ onDone }: { onDone: () => void }) {
  const add = useAddSite();
  return (
    <FormSheet
      title="Add a site"
      schema={siteBody}
      defaults={{ name: '', latitude: null, longitude: null, note: null }}
      button="Add the site"
      save={add.mutateAsync}
      onDone={onDone}
    >
      <Fields />
    </FormSheet>
  );
}

function ChangeSite({ site, onDone }: { site: Site; onDone: () => void }) {
  const change = useChangeSite(site.id);
  const { name, latitude, longitude, note, active } = site;
  return (
    <FormSheet
      title={`Change ${name}`}
      schema={changeSiteBody}
      defaults={{ name, latitude, longitude, note, active }}
      button="Save"
      save={change.mutateAsync}
      onDone={onDone}
    >
      <Fields />
      <InUseField name="active" inUse />
    </FormSheet>
  );
}

export default function SitesPage() {
  const query = useQuery(sitesQuery);
  const { role } = useMe();
  const [open, setOpen] = useState<Site | 'new' | null>(null);
  const mayChange = role !== 'crewChief';
  const close = () => setOpen(null);
  return (
    <ListPage
      title="Sites"
      what="the sites"
      query={query}
      action={
        mayChange && (
          <div className="page-actions">
            <Link to="/control-points">Control points</Link>
            <ImportLink kind="sites" />
            <Button appearance="primary" onClick={() => setOpen('new')}>
              Add a site
            </Button>
          </div>
        )
      }
    >
      {(sites) => (
        <>
          {sites.length === 0 ? (
            <Empty title="No site yet">
              Add the places where your crews work, so that the plan can show who is where.
            </Empty>
          ) : (
            <DataTable
              label="Sites"
              rows={sites}
              rowKey={({ id }) => id}
              isFaded={({ active }) => !active}
              columns={[
                { name: 'Site', cell: (site) => <strong>{site.name}</strong> },
                { name: 'Latitude', figure: true, cell: (site) => site.latitude?.toFixed(4) ?? '–' },
                { name: 'Longitude', figure: true, cell: (site) => site.longitude?.toFixed(4) ?? '–' },
                { name: 'Crews', cell: (site) => site.crewNames.join(', ') || '–' },
                { name: 'Note', cell: (site) => site.note ?? '' },
                { name: 'In use', cell: (site) => (site.active ? 'yes' : 'put away') },
                {
                  name: 'Change',
                  cell: (site) =>
                    mayChange && (
                      <Button size="small" onClick={() => setOpen(site)} aria-label={`Change ${site.name}`}>
                        Change
                      </Button>
                    ),
                },
              ]}
            />
          )}
          {open === 'new' && <AddSite onDone={close} />}
          {open !== null && open !== 'new' && <ChangeSite site={open} onDone={close} />}
        </>
      )}
    </ListPage>
  );
}
