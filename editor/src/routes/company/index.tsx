import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useNavigate } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Button, LinkButton } from '../../components/button';
import { Dialog } from '../../components/dialog';
import { Page, Section } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { showProblem, showToast } from '../../components/toast';
import { type Company, companyQuery, useExportCompany } from '../../features/company/api';
import styles from '../../features/company/company.module.css';
import { DeleteCompanyForm } from '../../features/company/delete-company';
import { CompanyFacts } from '../../features/company/facts';
import { NameForm } from '../../features/company/name-form';
import { SettingsForm } from '../../features/company/settings-form';
import { sentenceOf } from '../../lib/api/client';
import { useAbilities } from '../../lib/me';

export default function CompanyScreen() {
  const company = useQuery(companyQuery);
  const { editCompany, editPriceBook, sell } = useAbilities();
  return (
    <Page
      title={company.data?.name ?? 'Company'}
      tabTitle="Company"
      narrow
      actions={
        <>
          {editPriceBook && <LinkButton to={paths.priceBook}>Price book</LinkButton>}
          {sell && <LinkButton to={paths.proposalTexts}>Texts of proposals</LinkButton>}
          <LinkButton to={paths.people}>People</LinkButton>
        </>
      }
    >
      {company.isPending && <SkeletonRows rows={6} label="Loading the company" />}
      {company.isError && <Problem error={company.error} onRetry={() => company.refetch()} />}
      {company.data &&
        (editCompany ? <OwnerView company={company.data} /> : <CompanyFacts company={company.data} />)}
    </Page>
  );
}

function OwnerView({ company }: { company: Company }) {
  const navigate = useNavigate();
  const [deleting, setDeleting] = useState(false);
  const download = useExportCompany();
  return (
    <>
      <Section title="Name and region">
        <div className={styles.body}>
          <NameForm key={company.id} company={company} />
        </div>
      </Section>
      <Section
        title="Working values"
        lede="New plans begin with these. A plan that exists keeps the values it has."
      >
        <div className={styles.body}>
          {/* Another region brings other usual values: the form begins anew with them. */}
          <SettingsForm key={`${company.id} ${company.region}`} company={company} />
        </div>
      </Section>
      <Section
        title="Take everything with you"
        lede="One archive with clients, jobs, plans, the catalogue and every sheet's picture, in open formats."
      >
        <p className={styles.body}>
          <Button
            busy={download.isPending}
            onClick={() =>
              download.mutate(undefined, { onError: (error) => void showProblem(sentenceOf(error)) })
            }
          >
            {download.isPending ? 'Being put together' : 'Download the archive'}
          </Button>
        </p>
      </Section>
      <Section
        title="Delete the company"
        lede="Clients, jobs, plans and pictures are deleted for everybody, and nothing brings them back. Download the archive first."
      >
        <p className={styles.body}>
          <Button onClick={() => setDeleting(true)}>Delete the company…</Button>
        </p>
      </Section>
      <Dialog
        open={deleting}
        onOpenChange={setDeleting}
        title={`Delete ${company.name}?`}
        lede="This cannot be undone."
      >
        <DeleteCompanyForm
          company={company}
          onDone={() => {
            showToast({ message: `${company.name} is deleted.` });
            navigate(paths.jobs);
          }}
        />
      </Dialog>
    </>
  );
}
