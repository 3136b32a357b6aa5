import { Button } from '@fluentui/react-components';
import type { CorrectionSource } from '@hubtack/contracts/corrections/correction-source.js';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import { DataTable } from '../../components/data-table';
import { ListPage } from '../../components/list-page';
import { Empty } from '../../components/query-states';
import { correctionSourcesQuery } from '../../lib/corrections';
import { whenWords } from '../../lib/format';
import { useMe } from '../../lib/session';
import { useServerNow } from '../../live/use-lanes';
import { capitalised, sourceVerdict } from './check-words';
import { OutcomeMark } from './outcome-mark';
import { AddSource } from './source-sheets';
import { watchWords } from './watch-words';
import './corrections.css';

function LastCheck({ source }: { source: CorrectionSource }) {
  const { timeZone } = useMe();
  const now = useServerNow();
  const timeOf = (instant: string) => whenWords(Date.parse(instant), now, timeZone);
  return <OutcomeMark {...capitalised(sourceVerdict(source, timeOf))} />;
}

const baseWords = ({ decodedBase, baseLatitude }: CorrectionSource): string => {
  if (decodedBase) return `station ${decodedBase.stationId}, read from the stream`;
  return baseLatitude === null ? 'not known' : 'written by hand';
};

export default function CorrectionsPage() {
  const query = useQuery(correctionSourcesQuery);
  const { role } = useMe();
  const [isAdding, setIsAdding] = useState(false);
  const mayChange = role === 'technician' || role === 'manager';
  return (
    <ListPage
      title="Correction sources"
      what="the correction sources"
      query={query}
      action={
        mayChange && (
          <Button appearance="primary" onClick={() => setIsAdding(true)}>
            Add a source
          </Button>
        )
      }
    >
      {(sources) => (
        <>
          {sources.length === 0 ? (
            <Empty title="No correction source yet">
              Add the base stations and networks that your rovers use, and check them before a crew stands in
              the field without a fix.
            </Empty>
          ) : (
            <DataTable
              label="Correction sources"
              rows={sources}
              rowKey={({ id }) => id}
              columns={[
                {
                  name: 'Source',
                  cell: ({ id, name }) => (
                    <Link to={`/corrections/${id}`} className="check-link">
                      <strong>{name}</strong>
                    </Link>
                  ),
                },
                { name: 'Mount point', cell: ({ mountPoint }) => mountPoint },
                { name: 'Address', cell: ({ address, port }) => `${address}:${port}` },
                { name: 'Last check', cell: (source) => <LastCheck source={source} /> },
                { name: 'Watch', cell: ({ watchMinutes }) => watchWords(watchMinutes) },
                { name: 'Base', cell: baseWords },
              ]}
            />
          )}
          <p className="caution">
            A check proves that a stream comes and can be read. It does not prove a position: check into known
            control before and during work.
          </p>
          {isAdding && <AddSource onDone={() => setIsAdding(false)} />}
        </>
      )}
    </ListPage>
  );
}
