import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useState } from 'react';
import type { ExploreProps } from '@/features/views';
import { MapPlace } from './MapPlace';

/** The Map island: a query client of its own around the place. */
export function MapApp(props: ExploreProps) {
  const [client] = useState(
    () => new QueryClient({ defaultOptions: { queries: { retry: 1, refetchOnWindowFocus: false } } }),
  );
  return (
    <QueryClientProvider client={client}>
      <MapPlace {...props} />
    </QueryClientProvider>
  );
}
