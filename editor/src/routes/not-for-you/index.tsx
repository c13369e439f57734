import { paths } from '../../app/paths';
import { LinkButton } from '../../components/button';
import { Page } from '../../components/page';

/** A screen that the person's role does not open. The server refuses it all the same. */
export default function NotForYou() {
  return (
    <Page
      title="Not part of your role"
      lede="Your role in this company does not include this. An owner can change it under People."
      narrow
    >
      <LinkButton to={paths.jobs} kind="strong">
        Go to jobs
      </LinkButton>
    </Page>
  );
}
