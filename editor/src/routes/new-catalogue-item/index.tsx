import type { CatalogueCategory } from '@lampwright/geometry/catalogue';
import { useQuery } from '@tanstack/react-query';
import { useNavigate, useParams, useSearchParams } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Page } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { showToast } from '../../components/toast';
import { useAddItem, useArchiveItem, wholeCatalogueQuery } from '../../features/catalogue/api';
import { categoryLabel, categoryOf } from '../../features/catalogue/categories';
import { type Draft, draftOf, emptyDraft } from '../../features/catalogue/draft';
import { CatalogueForm } from '../../features/catalogue/item-form';
import { useAbilities } from '../../lib/me';
import NotForYou from '../not-for-you';
import NotFoundScreen from '../not-found';

export default function NewCatalogueItemScreen() {
  const { category: asked } = useParams();
  const [params] = useSearchParams();
  const { editCatalogue } = useAbilities();
  const category = categoryOf(asked);
  if (category === null) return <NotFoundScreen />;
  if (!editCatalogue) return <NotForYou />;
  const model = params.get('from');
  return (
    <Page
      title={`New ${category}`}
      back={{ to: `${paths.catalogue}?category=${category}`, label: categoryLabel(category) }}
      narrow
    >
      {model === null ? (
        <NewItem category={category} start={startOf(category)} />
      ) : (
        <FromModel key={model} category={category} model={model} />
      )}
    </Page>
  );
}

/** Cable is bought by the gauge that runs are made of, leads are thinner. */
const startOf = (category: CatalogueCategory): Draft =>
  category === 'cable' ? { ...emptyDraft, gauge: 'awg 12' } : emptyDraft;

function FromModel({ category, model }: { category: CatalogueCategory; model: string }) {
  const catalogue = useQuery(wholeCatalogueQuery);
  if (catalogue.isPending) return <SkeletonRows rows={6} label="Loading the item" />;
  if (catalogue.isError) return <Problem error={catalogue.error} onRetry={() => catalogue.refetch()} />;
  const found = catalogue.data.find(({ id, item }) => id === model && item.category === category);
  const start = found
    ? { ...draftOf(found.item), name: `${found.item.name}, copy`.slice(0, 120) }
    : startOf(category);
  return <NewItem category={category} start={start} />;
}

function NewItem({ category, start }: { category: CatalogueCategory; start: Draft }) {
  const navigate = useNavigate();
  const add = useAddItem();
  const archive = useArchiveItem();
  return (
    <CatalogueForm
      category={category}
      start={start}
      submitLabel={`Add the ${category}`}
      onSubmit={async (item) => {
        const entry = await add.mutateAsync(item);
        showToast({ message: `${item.name} is added.`, undo: () => archive.mutateAsync(entry.id) });
        navigate(`${paths.catalogue}?category=${category}`);
      }}
    />
  );
}
