import { paths } from '../../app/paths';
import { LinkButton } from '../../components/button';
import { Page } from '../../components/page';

export default function NotFoundScreen() {
  return (
    <Page
      title="There is no such page"
      lede="The address may be mistyped, or what was here has been removed."
      narrow
    >
      <LinkButton to={paths.jobs} kind="strong">
        Go to jobs
      </LinkButton>
    </Page>
  );
}
