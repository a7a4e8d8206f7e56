import { queryOptions } from '@tanstack/react-query';
import { decodeNetwork } from '@/features/network';
import type { Filter } from '@/features/views';
import { getBytes, getJson } from '@/lib/api';
import type { Handles } from '@/features/members';
import type { MemberDetail } from '@/features/members';

const query = (parameters: Record<string, string | undefined>): string => {
  const search = new URLSearchParams();
  for (const [key, value] of Object.entries(parameters)) if (value !== undefined) search.set(key, value);
  const text = search.toString();
  return text ? `?${text}` : '';
};

/** Snapshots never change, so what was fetched of one stays good. */
const forever = { staleTime: Infinity, gcTime: 600_000 } as const;

export const networkQuery = (snapshot: string, view?: string) =>
  queryOptions({
    ...forever,
    queryKey: ['network', snapshot, view],
    queryFn: async ({ signal }) =>
      decodeNetwork(
        (await getBytes(`/api/v1/snapshots/${snapshot}/network${query({ view })}`, signal)).buffer,
      ),
  });

export const handlesQuery = (snapshot: string, view?: string) =>
  queryOptions({
    ...forever,
    queryKey: ['handles', snapshot, view],
    queryFn: ({ signal }) =>
      getJson<Handles>(`/api/v1/snapshots/${snapshot}/handles${query({ view })}`, signal),
  });

export const columnQuery = (snapshot: string, field: string | null, view?: string) =>
  queryOptions({
    ...forever,
    queryKey: ['column', snapshot, field, view],
    enabled: field !== null,
    queryFn: async ({ signal }) => {
      const { buffer, headers } = await getBytes(
        `/api/v1/snapshots/${snapshot}/values${query({ field: field!, view })}`,
        signal,
      );
      const labels = headers.get('x-labels');
      return {
        values: new Float64Array(buffer),
        labels: labels ? (JSON.parse(decodeURIComponent(labels)) as string[]) : null,
      };
    },
  });

export const matchingQuery = (snapshot: string, filters: readonly Filter[], view?: string) =>
  queryOptions({
    ...forever,
    queryKey: ['matching', snapshot, filters, view],
    enabled: filters.length > 0,
    queryFn: async ({ signal }) =>
      new Uint8Array(
        (
          await getBytes(
            `/api/v1/snapshots/${snapshot}/matching${query({ filter: JSON.stringify(filters), view })}`,
            signal,
          )
        ).buffer,
      ),
  });

export const memberQuery = (
  snapshot: string,
  member: string | null,
  columns: readonly string[],
  view?: string,
) =>
  queryOptions({
    queryKey: ['member', snapshot, member, columns, view],
    enabled: member !== null,
    queryFn: ({ signal }) =>
      getJson<MemberDetail>(
        `/api/v1/snapshots/${snapshot}/members/${member}${query({ columns: columns.join(','), view })}`,
        signal,
      ),
  });
