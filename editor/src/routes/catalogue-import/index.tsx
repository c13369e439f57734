import { useNavigate } from 'react-router-dom';
import { paths } from '../../app/paths';
import { Page } from '../../components/page';
import { categories, categoryLabel } from '../../features/catalogue/categories';
import { Importer } from '../../features/catalogue-import/importer';
import { PastImports } from '../../features/catalogue-import/past-imports';

const choices = categories.map((value) => ({ value, label: categoryLabel(value) }));

export default function CatalogueImportScreen() {
  const navigate = useNavigate();
  return (
    <Page title="Take in a table" back={{ to: paths.catalogue, label: 'Catalogue' }}>
      <Importer categories={choices} onDone={() => navigate(paths.catalogue)} />
      <PastImports />
    </Page>
  );
}
