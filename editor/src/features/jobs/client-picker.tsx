import { useQuery } from '@tanstack/react-query';
import { useId, useState } from 'react';
import { type Control, useController } from 'react-hook-form';
import { SearchBox } from '../../components/search-box';
import { Problem, SkeletonRows } from '../../components/states';
import { clientListQuery, clientQuery } from '../../lib/clients';
import type { NewJobForm } from './new-job';
import styles from './pickers.module.css';

const MOST_SHOWN = 8;

/** Finds one of the company's clients by a few letters. */
export function ClientPicker({ control }: { control: Control<NewJobForm, unknown, NewJobForm> }) {
  const group = useId();
  const [search, setSearch] = useState('');
  const { field, fieldState } = useController({ control, name: 'clientId' });
  const found = useQuery(clientListQuery({ search }));
  const chosen = useQuery({ ...clientQuery(field.value), enabled: field.value !== '' });

  const listed = found.data?.items.slice(0, MOST_SHOWN) ?? [];
  // The chosen one stays in sight whatever is searched for.
  const rows =
    chosen.data && !listed.some((client) => client.id === chosen.data.id) ? [chosen.data, ...listed] : listed;
  const more = found.data ? found.data.total - listed.length : 0;

  return (
    <fieldset className={styles.picker}>
      <legend className="visually-hidden">Client</legend>
      <SearchBox label="Search clients" value={search} onSearch={setSearch} />
      {found.isPending && <SkeletonRows rows={3} label="Loading clients" />}
      {found.isError && <Problem error={found.error} onRetry={() => found.refetch()} />}
      {found.data && rows.length === 0 && <p className="quiet">No client by that name.</p>}
      <div className={styles.options}>
        {rows.map((client) => (
          <label key={client.id} className={styles.option}>
            <input
              type="radio"
              name={group}
              checked={field.value === client.id}
              onChange={() => field.onChange(client.id)}
            />
            <span>
              {client.name}
              {client.email && <small>{client.email}</small>}
            </span>
          </label>
        ))}
      </div>
      {more > 0 && <p className={styles.more}>{more} more: write a few letters of the name.</p>}
      {fieldState.error && (
        <p className={styles.error} role="alert">
          {fieldState.error.message}
        </p>
      )}
    </fieldset>
  );
}
