import { paths } from '../../app/paths';
import { Page } from '../../components/page';
import { InvitationsSection } from '../../features/members/invitations-section';
import { MembersSection } from '../../features/members/members-section';
import { useAbilities, useMe } from '../../lib/me';

export default function PeopleScreen() {
  const me = useMe();
  const { editMembers } = useAbilities();
  return (
    <Page
      title="People"
      lede={me.company ? `Who works in ${me.company.name}.` : undefined}
      back={{ to: paths.company, label: 'Company' }}
      narrow
    >
      <MembersSection />
      {editMembers && <InvitationsSection />}
    </Page>
  );
}
