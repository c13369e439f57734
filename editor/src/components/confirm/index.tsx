import { AlertDialog } from '@radix-ui/themes';
import type { ReactNode } from 'react';
import { Button } from '../button';
import { Problem } from '../states';
import styles from './confirm.module.css';

interface ConfirmProps {
  readonly open: boolean;
  readonly onOpenChange: (open: boolean) => void;
  readonly title: string;
  /** What will be gone. */
  readonly children: ReactNode;
  readonly doLabel: string;
  readonly busy: boolean;
  readonly error: unknown;
  readonly onConfirm: () => void;
}

/** Asks before what cannot be undone. Whatever can be undone is done at once instead, with an undo. */
export function Confirm({
  open,
  onOpenChange,
  title,
  children,
  doLabel,
  busy,
  error,
  onConfirm,
}: ConfirmProps) {
  return (
    <AlertDialog.Root open={open} onOpenChange={onOpenChange}>
      <AlertDialog.Content className={styles.content}>
        <AlertDialog.Title className={styles.title}>{title}</AlertDialog.Title>
        <AlertDialog.Description className={styles.text}>{children}</AlertDialog.Description>
        {error !== null && error !== undefined && <Problem error={error} />}
        <div className={styles.actions}>
          <AlertDialog.Cancel>
            <Button>Keep it</Button>
          </AlertDialog.Cancel>
          <Button kind="strong" busy={busy} onClick={onConfirm}>
            {doLabel}
          </Button>
        </div>
      </AlertDialog.Content>
    </AlertDialog.Root>
  );
}
