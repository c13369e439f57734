import { useQuery } from '@tanstack/react-query';
import { paths } from '../../app/paths';
import { Page } from '../../components/page';
import { Problem, SkeletonRows } from '../../components/states';
import { catalogueQuery, priceBookQuery } from '../../features/pricing/api';
import { PriceBookForm } from '../../features/pricing/price-book-form';
import { useAbilities } from '../../lib/me';
import NotForYou from '../not-for-you';

export default function PriceBookScreen() {
  const { editPriceBook } = useAbilities();
  return editPriceBook ? <Book /> : <NotForYou />;
}

function Book() {
  const book = useQuery(priceBookQuery);
  const catalogue = useQuery(catalogueQuery);
  const failed = [book, catalogue].find(({ isError, data }) => isError && data === undefined);
  return (
    <Page
      title="Price book"
      lede="What your work costs and how a price is made of it. Proposals that exist keep their prices."
      back={{ to: paths.company, label: 'Company' }}
      narrow
    >
      {failed && <Problem error={failed.error} onRetry={() => void failed.refetch()} />}
      {!failed && (!book.data || !catalogue.data) && (
        <SkeletonRows rows={10} label="Loading the price book" />
      )}
      {book.data && catalogue.data && <PriceBookForm answer={book.data} catalogue={catalogue.data} />}
    </Page>
  );
}
