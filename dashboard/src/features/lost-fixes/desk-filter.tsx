import { Button, Select } from '@fluentui/react-components';
import { useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { correctionSourcesQuery } from '../../lib/corrections';
import { crewsQuery } from '../../lib/crews';
import { roversQuery } from '../../lib/rovers';

interface Chosen {
  roverId: string | undefined;
  crewId: string | undefined;
  mountPoint: string | undefined;
}

/** Of one crew, rover or mount point: its history. */
export function DeskFilter({ chosen }: { chosen: Chosen }) {
  const [search, setSearch] = useSearchParams();
  const crews = useQuery(crewsQuery).data ?? [];
  const rovers = useQuery(roversQuery).data ?? [];
  const sources = useQuery(correctionSourcesQuery).data ?? [];
  const choose = (name: keyof Chosen, value: string) => {
    const next = new URLSearchParams(search);
    if (value === '') next.delete(name);
    else next.set(name, value);
    setSearch(next, { replace: true });
  };
  const choices = [
    { name: 'crewId', none: 'All crews', options: crews.map(({ id, name }) => [String(id), name]) },
    { name: 'roverId', none: 'All rovers', options: rovers.map(({ id, label }) => [String(id), label]) },
    {
      name: 'mountPoint',
      none: 'All mount points',
      options: [...new Set(sources.map(({ mountPoint }) => mountPoint))].map((one) => [one, one]),
    },
  ] as const;
  return (
    <div className="desk-filter" role="search" aria-label="Of one crew, rover or mount point">
      {choices.map(({ name, none, options }) => (
        <Select
          key={name}
          aria-label={none}
          value={chosen[name] ?? ''}
          onChange={(_, { value }) => choose(name, value)}
        >
          <option value="">{none}</option>
          {options.map(([value, label]) => (
            <option key={value} value={value}>
              {label}
            </option>
          ))}
        </Select>
      ))}
      {Object.values(chosen).some((value) => value !== undefined) && (
        <Button onClick={() => setSearch({}, { replace: true })}>Show all</Button>
      )}
    </div>
  );
}
