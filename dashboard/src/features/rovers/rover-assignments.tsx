import { assignRoverBody, type Rover } from '@hubtack/contracts/rovers/rover.js';
import { useQuery } from '@tanstack/react-query';
import { DataTable } from '../../components/data-table';
import { Form } from '../../components/form';
import { ChoiceField } from '../../components/form-fields';
import { Failed, Loading } from '../../components/query-states';
import { crewsQuery } from '../../lib/crews';
import { dayAndTime } from '../../lib/format';
import { roverAssignmentsQuery, useAssignRover } from '../../lib/rovers';
import { useMe } from '../../lib/session';

const nowOnly = assignRoverBody.omit({ startAt: true });

/** Who has the rover, who had it, and giving it to somebody else from now on. */
export function RoverAssignments({ rover }: { rover: Rover }) {
  const { data: assignments, error, refetch } = useQuery(roverAssignmentsQuery(rover.id));
  const { data: crews = [] } = useQuery(crewsQuery);
  const assign = useAssignRover(rover.id);
  const { timeZone } = useMe();
  const day = (at: string | null) => (at === null ? 'now' : dayAndTime(Date.parse(at), timeZone));
  if (!assignments)
    return error ? <Failed error={error} retry={() => void refetch()} /> : <Loading what="who had it" />;
  const options = crews
    .filter(({ active, id }) => active && id !== rover.crewId)
    .map(({ id, name }) => ({ value: id, label: name }));
  return (
    <section className="page-section">
      <h2>Crew</h2>
      <p>
        {rover.crewName ? (
          <>
            With <strong>{rover.crewName}</strong>. Its time counts for the crew that has it at that instant.
          </>
        ) : (
          'In the store, with no crew.'
        )}
      </p>
      <div className="page-narrow">
        <Form
          key={`${rover.crewId} ${options.length}`}
          schema={nowOnly}
          defaults={{ crewId: options[0]?.value ?? null }}
          button="Hand over now"
          submit={(body) => assign.mutateAsync(body)}
        >
          <ChoiceField
            name="crewId"
            label="Hand over to"
            options={options}
            none="The store (no crew)"
            as="number"
          />
        </Form>
      </div>
      {assignments.length > 0 && (
        <DataTable
          label="Crews that had the rover"
          rows={assignments}
          rowKey={({ id }) => id}
          columns={[
            { name: 'Crew', cell: ({ crewName }) => crewName },
            { name: 'From', cell: ({ startAt }) => day(startAt) },
            { name: 'To', cell: ({ endAt }) => day(endAt) },
          ]}
        />
      )}
    </section>
  );
}
