import { Confirm } from '../../components/confirm';
import { showToast } from '../../components/toast';
import type { Sheet } from '../../lib/sheets';
import { useRemoveSheet } from './api';

interface RemoveSheetProps {
  readonly jobId: string;
  readonly sheet: Sheet;
  readonly open: boolean;
  readonly onOpenChange: (open: boolean) => void;
}

/** A sheet goes with all that is drawn on it, and no button here brings it back: so this asks first. */
export function RemoveSheet({ jobId, sheet, open, onOpenChange }: RemoveSheetProps) {
  const remove = useRemoveSheet(jobId, sheet.id);
  return (
    <Confirm
      open={open}
      onOpenChange={onOpenChange}
      title={`Remove ${sheet.name}?`}
      doLabel="Remove the sheet"
      busy={remove.isPending}
      error={remove.error}
      onConfirm={() =>
        remove.mutate(undefined, {
          onSuccess: () => {
            onOpenChange(false);
            showToast({ message: `${sheet.name} is removed.` });
          },
        })
      }
    >
      {sheet.status === 'ready'
        ? 'It leaves the plan with everything drawn on it. Only an earlier version of the plan, from its history, brings it back.'
        : 'The file is deleted.'}
    </Confirm>
  );
}
