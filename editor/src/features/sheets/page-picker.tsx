import { Dialog } from '../../components/dialog';
import { Problem } from '../../components/states';
import type { Sheet } from '../../lib/sheets';
import { pagePreview, useChoosePage } from './api';
import styles from './sheets.module.css';

interface PagePickerProps {
  readonly jobId: string;
  readonly sheet: Sheet;
  readonly open: boolean;
  readonly onOpenChange: (open: boolean) => void;
}

/** Chooses the page of a document that becomes the sheet. */
export function PagePicker({ jobId, sheet, open, onOpenChange }: PagePickerProps) {
  const choose = useChoosePage(jobId, sheet.id);
  const pages = Array.from({ length: sheet.pageCount ?? 0 }, (_, i) => i + 1);
  return (
    <Dialog
      open={open}
      onOpenChange={onOpenChange}
      title="Which page is the plot plan?"
      lede={`${sheet.name} has ${pages.length} pages. One becomes the sheet; upload it again for another.`}
      wide
    >
      {choose.isError && <Problem error={choose.error} />}
      <div className={styles.pages} aria-busy={choose.isPending}>
        {pages.map((page) => (
          <button
            key={page}
            type="button"
            className={styles.page}
            disabled={choose.isPending}
            onClick={() => choose.mutate(page, { onSuccess: () => onOpenChange(false) })}
          >
            <img src={pagePreview(sheet.id, page)} alt="" loading="lazy" width="138" height="130" />
            Page {page}
          </button>
        ))}
      </div>
    </Dialog>
  );
}
