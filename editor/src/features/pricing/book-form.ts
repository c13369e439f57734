import type { PriceBook } from '@lampwright/geometry/price';
import type { ZodForm } from '../../components/form';

/** The form of the price book, as its parts take it. */
export type BookForm = ZodForm<PriceBook, PriceBook>;
