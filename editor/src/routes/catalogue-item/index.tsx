import { useQuery } from '@tanstack/react-query';
import { useNavigate, useParams } from 'react-router-dom';
import { paths, to } from '../../app/paths';
import { Button, LinkButton } from '../../components/button';
import { MenuItem, MoreMenu } from '../../components/more-menu';
import { Page } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { showProblem, showToast } from '../../components/toast';
import {
  type CatalogueEntry,
  useArchiveItem,
  useReplaceItem,
  useRestoreItem,
  wholeCatalogueQuery,
} from '../../features/catalogue/api';
import styles from '../../features/catalogue/catalogue.module.css';
import { categoryLabel } from '../../features/catalogue/categories';
import { draftOf } from '../../features/catalogue/draft';
import { ItemFacts } from '../../features/catalogue/item-facts';
import { CatalogueForm } from '../../features/catalogue/item-form';
import { ItemPriceSection } from '../../features/pricing/item-price-section';
import { sentenceOf } from '../../lib/api/client';
import { formatDay } from '../../lib/format';
import { useAbilities } from '../../lib/me';

export default function CatalogueItemScreen() {
  const { itemId = '' } = useParams();
  const catalogue = useQuery(wholeCatalogueQuery);
  const entry = catalogue.data?.find(({ id }) => id === itemId);
  if (entry) return <ItemPage key={entry.id} entry={entry} />;
  return (
    <Page title="Catalogue item" back={{ to: paths.catalogue, label: 'Catalogue' }} narrow>
      {catalogue.isPending && <SkeletonRows rows={6} label="Loading the item" />}
      {catalogue.isError && <Problem error={catalogue.error} onRetry={() => catalogue.refetch()} />}
      {catalogue.data && (
        <>
          <p>This item does not exist, or is not yours to see.</p>
          <p style={{ marginBlockStart: 16 }}>
            <LinkButton to={paths.catalogue}>Go to the catalogue</LinkButton>
          </p>
        </>
      )}
    </Page>
  );
}

function ItemPage({ entry: { id, item, archivedAt } }: { entry: CatalogueEntry }) {
  const navigate = useNavigate();
  const { editCatalogue, editPrices } = useAbilities();
  const replace = useReplaceItem(id);
  const archive = useArchiveItem();
  const restore = useRestoreItem();
  const list = `${paths.catalogue}?category=${item.category}`;
  const complain = (error: unknown) => void showProblem(sentenceOf(error));

  const putAway = () =>
    archive.mutate(id, {
      onSuccess: () => {
        showToast({ message: `${item.name} is archived.`, undo: () => restore.mutateAsync(id) });
        navigate(list);
      },
      onError: complain,
    });

  return (
    <Page
      title={item.name}
      back={{ to: list, label: categoryLabel(item.category) }}
      narrow
      actions={
        editCatalogue && (
          <MoreMenu label={`More for ${item.name}`}>
            <MenuItem onSelect={() => navigate(`${to.newCatalogueItem(item.category)}?from=${id}`)}>
              Begin a new item from this one
            </MenuItem>
            {archivedAt === null && <MenuItem onSelect={putAway}>Archive the item</MenuItem>}
          </MoreMenu>
        )
      }
    >
      {archivedAt !== null && (
        <div className={styles.archived}>
          <span>Archived on {formatDay(archivedAt)}. Plans that use it keep it.</span>
          {editCatalogue && (
            <Button busy={restore.isPending} onClick={() => restore.mutate(id, { onError: complain })}>
              Restore
            </Button>
          )}
        </div>
      )}
      {editCatalogue && archivedAt === null ? (
        <CatalogueForm
          category={item.category}
          start={draftOf(item)}
          submitLabel="Save"
          onSubmit={async (changed) => {
            await replace.mutateAsync(changed);
            showToast({ message: `${changed.name} is saved.`, undo: () => replace.mutateAsync(item) });
            navigate(list);
          }}
        />
      ) : (
        <ItemFacts item={item} />
      )}
      {editPrices && <ItemPriceSection itemId={id} category={item.category} editable={archivedAt === null} />}
    </Page>
  );
}
