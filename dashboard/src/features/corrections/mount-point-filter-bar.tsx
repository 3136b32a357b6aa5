import { Field, Input, Select } from '@fluentui/react-components';
import type { MountPoint } from '@hubtack/contracts/corrections/mount-point.js';
import { useMemo } from 'react';
import {
  authenticationWords,
  formatsOf,
  type Authentication,
  type MountPointFilter,
  type Sorting,
} from './mount-point-list';

interface MountPointFilterBarProps {
  mountPoints: readonly MountPoint[];
  filter: MountPointFilter;
  setFilter: (filter: MountPointFilter) => void;
  sorting: Sorting;
  setSorting: (sorting: Sorting) => void;
  hasPlace: boolean;
}

export function MountPointFilterBar(props: MountPointFilterBarProps) {
  const { mountPoints, filter, setFilter, sorting, setSorting, hasPlace } = props;
  const formats = useMemo(() => formatsOf(mountPoints), [mountPoints]);
  return (
    <div className="mount-point-filter" role="search" aria-label="Mount points">
      <Field label="Search">
        <Input
          type="search"
          value={filter.text}
          placeholder="name, town, network, message"
          onChange={(_, { value }) => setFilter({ ...filter, text: value })}
        />
      </Field>
      <Field label="Format">
        <Select
          value={filter.format ?? ''}
          onChange={(_, { value }) => setFilter({ ...filter, format: value || null })}
        >
          <option value="">any</option>
          {formats.map((format) => (
            <option key={format}>{format}</option>
          ))}
        </Select>
      </Field>
      <Field label="Login">
        <Select
          value={filter.authentication ?? ''}
          onChange={(_, { value }) =>
            setFilter({ ...filter, authentication: (value || null) as Authentication | null })
          }
        >
          <option value="">any</option>
          {Object.entries(authenticationWords).map(([value, words]) => (
            <option key={value} value={value}>
              {words}
            </option>
          ))}
        </Select>
      </Field>
      <Field label="Order">
        <Select value={sorting} onChange={(_, { value }) => setSorting(value as Sorting)}>
          <option value="distance" disabled={!hasPlace}>
            {hasPlace ? 'by distance' : 'by distance (choose a place first)'}
          </option>
          <option value="name">by name</option>
          <option value="network">by network</option>
        </Select>
      </Field>
    </div>
  );
}
