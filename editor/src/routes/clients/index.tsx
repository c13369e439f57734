import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate, useSearchParams } from 'react-router-dom';
import { to } from '../../app/paths';
import { Button } from '../../components/button';
import { Dialog } from '../../components/dialog';
import { PlusIcon } from '../../components/icons';
import { Page } from '../../components/page';
import { Pager } from '../../components/pager';
import { SearchBox } from '../../components/search-box';
import { Select } from '../../components/select';
import { Empty, Problem, SkeletonRows } from '../../components/states';
import { useAddClient } from '../../features/clients/api';
import { ClientForm } from '../../features/clients/client-form';
import { ClientTable } from '../../features/clients/client-table';
import styles from '../../features/clients/clients.module.css';
import { clientListQuery } from '../../lib/clients';
import { useAbilities } from '../../lib/me';

export default function ClientsScreen() {
  const [params, setParams] = useSearchParams();
  const search = params.get('search') ?? '';
  const archived = params.get('archived') === 'true';
  const page = Math.max(1, Math.trunc(Number(params.get('page') ?? '1')) || 1);
  const clients = useQuery(clientListQuery({ search, page, archived }));
  const { editJobs } = useAbilities();
  const [adding, setAdding] = useState(false);

  const show = (next: { search?: string; archived?: boolean; page?: number }) => {
    const asked = { search, archived, page: 1, ...next };
    const query = new URLSearchParams();
    if (asked.search !== '') query.set('search', asked.search);
    if (asked.archived) query.set('archived', 'true');
    if (asked.page > 1) query.set('page', String(asked.page));
    setParams(query, { replace: next.search !== undefined });
  };

  const nothing = clients.data?.total === 0;
  const filtered = search !== '' || archived;
  const newcomer = nothing && !filtered;
  const add = editJobs && (
    <Button kind="lamp" onClick={() => setAdding(true)}>
      <PlusIcon />
      New client
    </Button>
  );

  return (
    <Page title="Clients" actions={newcomer ? undefined : add}>
      {!newcomer && (
        <div className={styles.filters}>
          <SearchBox
            label="Search names, e-mail, phone"
            value={search}
            onSearch={(text) => show({ search: text })}
          />
          <Select
            aria-label="Which clients"
            value={archived ? 'archived' : 'current'}
            onChange={(event) => show({ archived: event.target.value === 'archived' })}
          >
            <option value="current">Current clients</option>
            <option value="archived">Archived clients</option>
          </Select>
        </div>
      )}
      {clients.isPending && <SkeletonRows rows={8} label="Loading clients" />}
      {clients.isError && <Problem error={clients.error} onRetry={() => clients.refetch()} />}
      {newcomer && (
        <Empty title="No clients yet" action={add || undefined}>
          {editJobs
            ? 'A client is whoever owns the garden. Making a job adds its client too.'
            : 'Clients are listed here once an owner or designer adds one.'}
        </Empty>
      )}
      {nothing && filtered && (
        <Empty
          title={archived && search === '' ? 'Nobody is archived' : 'No client matches'}
          action={
            <Button onClick={() => show({ search: '', archived: false })}>Show all current clients</Button>
          }
        >
          {archived ? 'Clients that you archive are kept here.' : 'Try fewer letters.'}
        </Empty>
      )}
      {clients.data && !nothing && (
        <>
          <ClientTable clients={clients.data.items} hrefOf={to.client} />
          <Pager
            page={clients.data.page}
            pageSize={clients.data.pageSize}
            total={clients.data.total}
            noun={archived ? 'archived clients' : 'clients'}
            onPage={(next) => show({ page: next })}
          />
        </>
      )}
      <Dialog open={adding} onOpenChange={setAdding} title="New client">
        <AddClient />
      </Dialog>
    </Page>
  );
}

function AddClient() {
  const navigate = useNavigate();
  const add = useAddClient();
  return (
    <ClientForm
      start={{ name: '', email: null, phone: null }}
      label="New client"
      submitLabel="Add the client"
      onSubmit={async (fields) => {
        const client = await add.mutateAsync(fields);
        navigate(to.client(client.id));
      }}
    />
  );
}
