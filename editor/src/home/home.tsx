import type { Link } from './link';
import { Proposal } from './proposal';
import { GoneLink, LoadFailed, OtherBrowser, Skeleton, UnknownLink } from './states';
import { useOpened } from './use-opened';
import { useSharedPage } from './use-shared-page';

/** The homeowner's page: whatever the address stands for. */
export function Home({ link }: { readonly link: Link }) {
  switch (link.kind) {
    case 'unknown':
      return <UnknownLink />;
    case 'gone':
      return <GoneLink />;
    case 'live':
      return <Live linkId={link.id} back={link.back} />;
  }
}

function Live({ linkId, back }: { readonly linkId: string; readonly back: boolean }) {
  useOpened(linkId);
  const { loaded, retry, refresh, replace } = useSharedPage(linkId);
  switch (loaded.kind) {
    case 'loading':
      return <Skeleton />;
    case 'failed':
      if (back && loaded.trouble.status === 404) return <OtherBrowser />;
      return <LoadFailed trouble={loaded.trouble} onRetry={retry} />;
    case 'ready':
      return <Proposal linkId={linkId} page={loaded.page} refresh={refresh} replace={replace} />;
  }
}
