import { Field, Select } from '@fluentui/react-components';
import { useQuery } from '@tanstack/react-query';
import { useSearchParams } from 'react-router-dom';
import { roversQuery } from '../../lib/rovers';
import { sitesQuery } from '../../lib/sites';

/** For which site or rover; kept in the address, so that it goes along from page to page. */
export function usePlaceChoice() {
  const [search, setSearch] = useSearchParams();
  const choice = search.get('for') ?? '';
  const choose = (next: string) =>
    setSearch(
      (before) => {
        if (next === '') before.delete('for');
        else before.set('for', next);
        return before;
      },
      { replace: true },
    );
  return { choice, choose, search: choice === '' ? '' : `?for=${choice}` };
}

interface PlaceFieldProps {
  label: string;
  choice: string;
  choose: (choice: string) => void;
}

export function PlaceField({ label, choice, choose }: PlaceFieldProps) {
  const { data: sites = [] } = useQuery(sitesQuery);
  const { data: rovers = [] } = useQuery(roversQuery);
  const placed = sites.filter(({ active, latitude }) => active && latitude !== null);
  return (
    <Field label={label} className="place-field">
      <Select value={choice} onChange={(_, { value }) => choose(value)}>
        <option value="">no place in particular</option>
        <optgroup label="Sites">
          {placed.map(({ id, name }) => (
            <option key={id} value={`site-${id}`}>
              {name}
            </option>
          ))}
        </optgroup>
        <optgroup label="Rovers, where they were last heard">
          {rovers
            .filter(({ retired }) => !retired)
            .map(({ id, label: name, crewName }) => (
              <option key={id} value={`rover-${id}`}>
                {crewName === null ? name : `${name}, ${crewName}`}
              </option>
            ))}
        </optgroup>
      </Select>
    </Field>
  );
}
