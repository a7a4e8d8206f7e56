import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useState } from 'react';
import type { ExploreProps } from '@/features/views';
import { MembersPlace } from './MembersPlace';

/** The Members island: a query client of its own around the place. */
export function MembersApp(props: ExploreProps) {
  const [client] = useState(
    () => new QueryClient({ defaultOptions: { queries: { retry: 1, refetchOnWindowFocus: false } } }),
  );
  return (
    <QueryClientProvider client={client}>
      <MembersPlace {...props} />
    </QueryClientProvider>
  );
}
