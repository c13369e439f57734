import { DropdownMenu } from '@radix-ui/themes';
import type { ReactNode } from 'react';
import { Button } from './button';
import { MoreIcon } from './icons';

/** What else can be done with something, behind three dots. */
export function MoreMenu({ label, children }: { label: string; children: ReactNode }) {
  return (
    <DropdownMenu.Root>
      <DropdownMenu.Trigger>
        <Button icon aria-label={label}>
          <MoreIcon />
        </Button>
      </DropdownMenu.Trigger>
      <DropdownMenu.Content align="end" color="gray">
        {children}
      </DropdownMenu.Content>
    </DropdownMenu.Root>
  );
}

export const MenuItem = ({ onSelect, children }: { onSelect: () => void; children: ReactNode }) => (
  <DropdownMenu.Item onSelect={onSelect}>{children}</DropdownMenu.Item>
);
