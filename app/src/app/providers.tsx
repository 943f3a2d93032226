import { Theme } from '@radix-ui/themes';
import { QueryClientProvider } from '@tanstack/react-query';
import { type ReactNode, useState } from 'react';
import { createQueryClient } from '@/lib/query-client';
import { useTheme } from '@/lib/theme';

/** Theme and query cache around the router. */
export function Providers({ children }: { children: ReactNode }) {
  const { appearance } = useTheme();
  const [queryClient] = useState(createQueryClient);
  return (
    <QueryClientProvider client={queryClient}>
      <Theme
        accentColor="bronze"
        grayColor="sand"
        radius="small"
        panelBackground="solid"
        appearance={appearance}
        hasBackground={false}
      >
        {children}
      </Theme>
    </QueryClientProvider>
  );
}
