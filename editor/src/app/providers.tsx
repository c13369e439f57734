import { Theme } from '@radix-ui/themes';
import { type QueryClient, QueryClientProvider } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { ToastRegion } from '../components/toast';
import { useAppearance } from './appearance';

interface ProvidersProps {
  readonly queryClient: QueryClient;
  readonly children: ReactNode;
}

export function Providers({ queryClient, children }: ProvidersProps) {
  return (
    <QueryClientProvider client={queryClient}>
      <Themed>{children}</Themed>
    </QueryClientProvider>
  );
}

function Themed({ children }: { children: ReactNode }) {
  const appearance = useAppearance();
  return (
    <Theme appearance={appearance} accentColor="gray" grayColor="sand" radius="small" panelBackground="solid">
      {children}
      <ToastRegion />
    </Theme>
  );
}
