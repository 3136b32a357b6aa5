import { Button } from '@fluentui/react-components';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import { DataTable } from '../../components/data-table';
import { ListPage } from '../../components/list-page';
import { Empty } from '../../components/query-states';
import { roversQuery } from '../../lib/rovers';
import { useMe } from '../../lib/session';
import { LastHeard } from './last-heard';
import { AddRover } from './rover-form';

export default function RoversPage() {
  const query = useQuery(roversQuery);
  const { role } = useMe();
  const [isAdding, setIsAdding] = useState(false);
  const mayChange = role === 'technician' || role === 'manager';
  return (
    <ListPage
      title="Rovers"
      what="the rovers"
      query={query}
      action={
        <div className="page-actions">
          <Link to="/check-shots">Checks of a day</Link>
          {mayChange && (
            <Button appearance="primary" onClick={() => setIsAdding(true)}>
              Add a rover
            </Button>
          )}
        </div>
      }
    >
      {(rovers) => (
        <>
          {rovers.length === 0 ? (
            <Empty title="No rover yet">Add one, issue its key, and it can report.</Empty>
          ) : (
            <DataTable
              label="Rovers"
              rows={rovers}
              rowKey={({ id }) => id}
              isFaded={({ retired }) => retired}
              columns={[
                { name: 'Rover', cell: (rover) => <Link to={`/rovers/${rover.id}`}>{rover.label}</Link> },
                { name: 'Crew', cell: (rover) => rover.crewName ?? 'in the store' },
                { name: 'Mount point', cell: (rover) => rover.mountPoint ?? 'not set' },
                { name: 'Receiver', cell: (rover) => rover.receiver ?? '–' },
                { name: 'Serial number', cell: (rover) => rover.serial ?? '–' },
                { name: 'Keys', figure: true, cell: (rover) => rover.activeKeys },
                { name: 'Last heard', cell: (rover) => <LastHeard at={rover.lastHeardAt} /> },
                { name: 'In use', cell: (rover) => (rover.retired ? 'put away' : 'yes') },
              ]}
            />
          )}
          {isAdding && <AddRover onDone={() => setIsAdding(false)} />}
        </>
      )}
    </ListPage>
  );
}
