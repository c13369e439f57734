import { LinkButton } from '../../components/button';
import { Page } from '../../components/page';
import { useMe } from '../../lib/me';
import { paths } from '../paths';

/** For somebody who left, or whose company was deleted. */
export function NoCompany() {
  const me = useMe();
  return (
    <Page
      title="You are in no company at present"
      lede={
        me.companies.length > 0
          ? 'Change to another of your companies in the menu at the top right.'
          : `Ask an owner to invite ${me.user.email}; the invitation arrives by mail.`
      }
      narrow
    >
      <LinkButton to={paths.account}>Your account</LinkButton>
    </Page>
  );
}
