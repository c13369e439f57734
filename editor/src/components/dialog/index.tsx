import { Dialog as RadixDialog } from '@radix-ui/themes';
import type { ReactNode } from 'react';
import { Button } from '../button';
import { CloseIcon } from '../icons';
import styles from './dialog.module.css';

interface DialogProps {
  readonly open: boolean;
  readonly onOpenChange: (open: boolean) => void;
  readonly title: string;
  readonly lede?: ReactNode;
  readonly wide?: boolean;
  readonly children: ReactNode;
}

/** A question over the screen; Escape and the cross leave it, focus returns to what opened it. */
export function Dialog({ open, onOpenChange, title, lede, wide = false, children }: DialogProps) {
  return (
    <RadixDialog.Root open={open} onOpenChange={onOpenChange}>
      <RadixDialog.Content
        className={styles.content}
        data-wide={wide ? '' : undefined}
        aria-describedby={lede ? undefined : ''}
      >
        <div className={styles.head}>
          <RadixDialog.Title className={styles.title}>{title}</RadixDialog.Title>
          <RadixDialog.Close>
            <Button kind="bare" icon aria-label="Close">
              <CloseIcon />
            </Button>
          </RadixDialog.Close>
        </div>
        {lede && <RadixDialog.Description className={styles.lede}>{lede}</RadixDialog.Description>}
        {children}
      </RadixDialog.Content>
    </RadixDialog.Root>
  );
}
