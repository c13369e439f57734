import { useQuery } from '@tanstack/react-query';
import { Link, useNavigate, useSearchParams } from 'react-router-dom';
import { paths, to } from '../../app/paths';
import { Button, LinkButton } from '../../components/button';
import { PlusIcon } from '../../components/icons';
import { MenuItem, MoreMenu } from '../../components/more-menu';
import { Page } from '../../components/page';
import { SearchBox } from '../../components/search-box';
import { Select } from '../../components/select';
import { Empty, Problem, SkeletonRows } from '../../components/states';
import { showProblem } from '../../components/toast';
import { catalogueQuery } from '../../features/catalogue/api';
import styles from '../../features/catalogue/catalogue.module.css';
import { categories, categoryLabel, categoryOf } from '../../features/catalogue/categories';
import { ItemTable } from '../../features/catalogue/item-table';
import { useSaveCatalogue } from '../../features/catalogue-import/api';
import { sentenceOf } from '../../lib/api/client';
import { useAbilities } from '../../lib/me';

export default function CatalogueScreen() {
  const [params, setParams] = useSearchParams();
  const category = categoryOf(params.get('category')) ?? 'fixture';
  const search = params.get('search') ?? '';
  const archived = params.get('archived') === 'true';
  const entries = useQuery(catalogueQuery({ category, search, archived }));
  const { editCatalogue } = useAbilities();
  const navigate = useNavigate();
  const save = useSaveCatalogue();
  const saveAs = (format: 'csv' | 'xlsx') =>
    save.mutate(format, { onError: (error) => void showProblem(sentenceOf(error)) });

  const show = (next: { search?: string; archived?: boolean }) => {
    const asked = { search, archived, ...next };
    const query = new URLSearchParams({ category });
    if (asked.search !== '') query.set('search', asked.search);
    if (asked.archived) query.set('archived', 'true');
    setParams(query, { replace: next.search !== undefined });
  };

  const add = editCatalogue && (
    <LinkButton to={to.newCatalogueItem(category)} kind="strong">
      <PlusIcon />
      New {category}
    </LinkButton>
  );
  const tables = editCatalogue && (
    <MoreMenu label="More for the catalogue">
      <MenuItem onSelect={() => navigate(paths.catalogueImport)}>Take in a table (CSV, XLSX)</MenuItem>
      <MenuItem onSelect={() => saveAs('csv')}>Save as CSV</MenuItem>
      <MenuItem onSelect={() => saveAs('xlsx')}>Save as XLSX</MenuItem>
    </MoreMenu>
  );
  const nothing = entries.data?.length === 0;
  const filtered = search !== '' || archived;

  return (
    <Page
      title="Catalogue"
      lede="What you install. A plan keeps its own copy of each item that it uses."
      actions={
        <>
          {tables}
          {add}
        </>
      }
    >
      <nav className={styles.tabs} aria-label="Categories">
        {categories.map((one) => (
          <Link
            key={one}
            to={`${paths.catalogue}?category=${one}`}
            className={styles.tab}
            aria-current={one === category ? 'page' : undefined}
          >
            {categoryLabel(one)}
          </Link>
        ))}
      </nav>
      <div className={styles.filters}>
        <SearchBox
          label={`Search ${categoryLabel(category).toLowerCase()}`}
          value={search}
          onSearch={(text) => show({ search: text })}
        />
        <Select
          aria-label="Which items"
          value={archived ? 'archived' : 'current'}
          onChange={(event) => show({ archived: event.target.value === 'archived' })}
        >
          <option value="current">Current items</option>
          <option value="archived">Archived items</option>
        </Select>
      </div>
      {entries.isPending && <SkeletonRows rows={8} label="Loading the catalogue" />}
      {entries.isError && <Problem error={entries.error} onRetry={() => entries.refetch()} />}
      {nothing && !filtered && (
        <Empty title="Nothing here yet" action={add || undefined}>
          {`Add the ${categoryLabel(category).toLowerCase()} that you install; plans choose from them.`}
        </Empty>
      )}
      {nothing && filtered && (
        <Empty
          title={archived && search === '' ? 'Nothing is archived' : 'Nothing matches'}
          action={
            <Button onClick={() => show({ search: '', archived: false })}>Show all current items</Button>
          }
        >
          {archived ? 'Items that you archive are kept here; plans keep them anyway.' : 'Try fewer letters.'}
        </Empty>
      )}
      {entries.data && !nothing && (
        <ItemTable entries={entries.data} label={categoryLabel(category)} hrefOf={to.catalogueItem} />
      )}
    </Page>
  );
}
