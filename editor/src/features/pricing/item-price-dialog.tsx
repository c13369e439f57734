import { useQuery } from '@tanstack/react-query';
import { Dialog } from '../../components/dialog';
import { Problem, SkeletonRows } from '../../components/states';
import { showToast } from '../../components/toast';
import { cataloguePricesQuery } from './api';
import { emptyPrice, ItemPriceForm } from './item-price-form';

export interface ItemToPrice {
  readonly itemId: string;
  readonly name: string;
}

/** Prices an item right where its price is missing. */
export function ItemPriceDialog({
  item,
  onClose,
}: {
  readonly item: ItemToPrice | null;
  readonly onClose: () => void;
}) {
  return (
    <Dialog
      open={item !== null}
      onOpenChange={(open) => !open && onClose()}
      title={item?.name ?? 'Price'}
      lede="The price holds for every job that has no proposal yet."
    >
      {item && <Body item={item} onClose={onClose} />}
    </Dialog>
  );
}

function Body({ item, onClose }: { readonly item: ItemToPrice; readonly onClose: () => void }) {
  const prices = useQuery(cataloguePricesQuery);
  if (prices.isPending) return <SkeletonRows rows={4} label="Loading the prices" />;
  if (prices.isError) return <Problem error={prices.error} onRetry={() => void prices.refetch()} />;
  const { currency, locale, seesCosts, items } = prices.data;
  const known = items.find(({ itemId }) => itemId === item.itemId);
  return (
    <ItemPriceForm
      itemId={item.itemId}
      start={known?.price ?? emptyPrice('each')}
      manner={{ currency, locale }}
      seesCosts={seesCosts}
      onSaved={() => {
        showToast({ message: `${item.name} has a price.` });
        onClose();
      }}
    />
  );
}
