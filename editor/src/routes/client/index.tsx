import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useParams } from 'react-router-dom';
import { paths, to } from '../../app/paths';
import { Button, LinkButton } from '../../components/button';
import { Dialog } from '../../components/dialog';
import { MenuItem, MoreMenu } from '../../components/more-menu';
import { Page, Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { showProblem, showToast } from '../../components/toast';
import { useArchiveClient, useEditClient, useRestoreClient } from '../../features/clients/api';
import { ClientForm } from '../../features/clients/client-form';
import styles from '../../features/clients/clients.module.css';
import { PropertiesSection } from '../../features/clients/properties-section';
import { sentenceOf } from '../../lib/api/client';
import { type Client, clientQuery } from '../../lib/clients';
import { formatDay } from '../../lib/format';
import { useAbilities } from '../../lib/me';

const back = { to: paths.clients, label: 'Clients' };

export default function ClientScreen() {
  const { clientId = '' } = useParams();
  const client = useQuery(clientQuery(clientId));
  if (client.data) return <ClientPage key={clientId} client={client.data} />;
  return (
    <Page title="Client" back={back}>
      {client.isError ? (
        <Problem error={client.error} onRetry={() => client.refetch()} />
      ) : (
        <SkeletonRows rows={4} label="Loading the client" />
      )}
    </Page>
  );
}

function ClientPage({ client }: { client: Client }) {
  const { editJobs } = useAbilities();
  const [editing, setEditing] = useState(false);
  const edit = useEditClient(client.id);
  const archive = useArchiveClient(client.id);
  const restore = useRestoreClient(client.id);
  const archived = client.archivedAt !== null;
  const editable = editJobs && !archived;
  const complain = (error: unknown) => void showProblem(sentenceOf(error));

  const putAway = () =>
    archive.mutate(undefined, {
      onSuccess: () =>
        showToast({ message: `${client.name} is archived.`, undo: () => restore.mutateAsync(undefined) }),
      onError: complain,
    });

  return (
    <Page
      title={client.name}
      back={back}
      narrow
      lede={
        <span className={styles.contact}>
          {client.email && <a href={`mailto:${client.email}`}>{client.email}</a>}
          {client.phone && <a href={`tel:${client.phone.replace(/[^+\d]/g, '')}`}>{client.phone}</a>}
          {!client.email && !client.phone && 'No e-mail or phone noted.'}
        </span>
      }
      actions={
        editable && (
          <>
            <MoreMenu label={`More for ${client.name}`}>
              <MenuItem onSelect={() => setEditing(true)}>Edit name and contact</MenuItem>
              <MenuItem onSelect={putAway}>Archive the client</MenuItem>
            </MoreMenu>
            <LinkButton to={to.newJobFor(client.id)} kind="lamp">
              New job
            </LinkButton>
          </>
        )
      }
    >
      {client.archivedAt !== null && (
        <div className={styles.archived}>
          <span>Archived on {formatDay(client.archivedAt)}.</span>
          {editJobs && (
            <Button busy={restore.isPending} onClick={() => restore.mutate(undefined, { onError: complain })}>
              Restore
            </Button>
          )}
        </div>
      )}
      <PropertiesSection clientId={client.id} editable={editable} />
      <Section title="Jobs">
        <p style={{ marginBlockStart: 12 }}>
          <LinkButton to={`${paths.jobs}?search=${encodeURIComponent(client.name)}`}>
            Show the jobs of {client.name}
          </LinkButton>
        </p>
      </Section>
      <Dialog open={editing} onOpenChange={setEditing} title="Name and contact">
        <ClientForm
          start={{ name: client.name, email: client.email, phone: client.phone }}
          label="Name and contact"
          submitLabel="Save"
          onSubmit={async (fields) => {
            await edit.mutateAsync(fields);
            setEditing(false);
          }}
        />
      </Dialog>
    </Page>
  );
}
