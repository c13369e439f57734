import { useQuery } from '@tanstack/react-query';
import { paths } from '../../app/paths';
import { Page } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { proposalTextsQuery } from '../../features/proposal/api';
import { TextsForm } from '../../features/proposal/texts-form';
import { useAbilities } from '../../lib/me';
import NotForYou from '../not-for-you';

export default function ProposalTextsScreen() {
  const { sell } = useAbilities();
  return sell ? <Texts /> : <NotForYou />;
}

function Texts() {
  const texts = useQuery({ ...proposalTextsQuery, refetchOnWindowFocus: false });
  return (
    <Page
      title="Texts of proposals"
      lede="What every proposal says. A job can say something else in its place; revisions that exist keep what they have."
      back={{ to: paths.company, label: 'Company' }}
      narrow
    >
      {texts.isPending && <SkeletonRows rows={8} label="Loading the texts" />}
      {texts.isError && <Problem error={texts.error} onRetry={() => texts.refetch()} />}
      {/* A newer version begins the form anew: what is saved is always what was last seen. */}
      {texts.data && <TextsForm key={texts.data.version} answer={texts.data} />}
    </Page>
  );
}
