import { useNavigate } from 'react-router-dom';
import { paths } from '../../app/paths';
import { LinkButton } from '../../components/button';
import { Problem, SkeletonRows } from '../../components/states';
import { showToast } from '../../components/toast';
import { type InvitationLook, useInvitation } from '../../features/auth/api';
import { Front } from '../../features/auth/front';
import { Join } from '../../features/auth/join';
import { useLinkToken } from '../../lib/link-token';
import { type Role, useMaybeMe } from '../../lib/me';

function mayDo(role: Role): string {
  switch (role) {
    case 'owner':
      return 'As an owner you may do everything, the company and its people included.';
    case 'designer':
      return 'As a designer you make jobs and plans and keep the catalogue.';
    case 'crew':
      return 'As crew you see jobs and plans and fill in site walks.';
  }
}

const ledeOf = (invitation: InvitationLook) =>
  `The invitation is for ${invitation.email}. ${mayDo(invitation.role)}`;

export default function InvitationScreen() {
  const token = useLinkToken();
  const navigate = useNavigate();
  const invitation = useInvitation(token);
  const me = useMaybeMe();

  if (token === '')
    return (
      <Front title="Invitation">
        <Problem error="This link is not complete. Open it from the mail again." />
      </Front>
    );
  if (invitation.isPending || me.isPending)
    return (
      <Front title="Invitation">
        <SkeletonRows rows={2} label="Reading the invitation" />
      </Front>
    );
  if (invitation.isError)
    return (
      <Front title="Invitation" foot={<LinkButton to={paths.signIn}>Go to sign in</LinkButton>}>
        <Problem error={invitation.error} />
      </Front>
    );
  return (
    <Front title={`Join ${invitation.data.companyName}`} lede={ledeOf(invitation.data)}>
      <Join
        token={token}
        me={me.data ?? null}
        invitation={invitation.data}
        onDone={() => {
          showToast({ message: `You have joined ${invitation.data.companyName}.` });
          navigate(paths.jobs, { replace: true });
        }}
      />
    </Front>
  );
}
