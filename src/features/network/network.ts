import * as z from 'zod';
import { idSchema } from '@/lib/ids';
import { operation } from '@/lib/operation';
import { NETWORK_TYPE } from './binary';

export const communitySchema = z
  .object({ id: z.string(), name: z.string(), createdAt: z.string(), snapshots: z.int() })
  .meta({ id: 'Community' });
export type CommunityView = z.infer<typeof communitySchema>;

export const snapshotAttributeSchema = z.object({
  id: z.string(),
  name: z.string(),
  type: z.enum(['number', 'label']),
  direction: z.enum(['higher-better', 'higher-worse', 'neither']),
  sensitive: z.boolean(),
  observed: z.int(),
  summary: z.record(z.string(), z.unknown()),
});

export const snapshotSchema = z
  .object({
    id: z.string(),
    communityId: z.string(),
    takenOn: z.string(),
    label: z.string(),
    members: z.int(),
    ties: z.int(),
    totalWeight: z.number(),
    components: z.int(),
    largestComponent: z.int(),
    isolated: z.int(),
    attributes: z.array(snapshotAttributeSchema),
    createdAt: z.string(),
  })
  .meta({ id: 'Snapshot' });
export type SnapshotView = z.infer<typeof snapshotSchema>;

export const spectrumSchema = z
  .object({
    laplacian: z.string(),
    values: z.array(z.number()),
    residuals: z.array(z.number()),
    complete: z.boolean(),
  })
  .meta({ id: 'Spectrum' });
export type SpectrumView = z.infer<typeof spectrumSchema>;

const workspace = z.object({ workspace: idSchema });
const community = z.object({ community: idSchema });
const snapshot = z.object({ snapshot: idSchema });
const throughView = z.object({ view: idSchema.optional() });
const shared = { tag: 'Snapshots', access: 'person' } as const;

export const networkOperations = {
  listCommunities: operation({
    ...shared,
    id: 'listCommunities',
    method: 'get',
    path: '/api/v1/workspaces/{workspace}/communities',
    summary: 'Communities of a workspace',
    params: workspace,
    status: 200,
    response: z.object({ items: z.array(communitySchema) }),
  }),
  createCommunity: operation({
    ...shared,
    id: 'createCommunity',
    method: 'post',
    path: '/api/v1/workspaces/{workspace}/communities',
    summary: 'Make a community',
    params: workspace,
    body: z.object({ name: z.string().trim().min(1, 'Give the community a name.').max(120) }),
    status: 201,
    response: communitySchema,
  }),
  listSnapshots: operation({
    ...shared,
    id: 'listSnapshots',
    method: 'get',
    path: '/api/v1/communities/{community}/snapshots',
    summary: 'Snapshots of a community, newest first',
    params: community,
    status: 200,
    response: z.object({ items: z.array(snapshotSchema) }),
  }),
  getSnapshot: operation({
    ...shared,
    id: 'getSnapshot',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}',
    summary: 'Counts, components, attributes',
    params: snapshot,
    query: throughView,
    status: 200,
    response: snapshotSchema,
  }),
  network: operation({
    ...shared,
    id: 'getNetwork',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/network',
    summary:
      'Positions, ties and degrees, binary, little-endian: "THRM", uint32 version 1, uint32 members n, uint32 ties m, then float32 x[n], float32 y[n], int32 degree[n], float32 strength[n], int32 component[n], int32 source[m], int32 target[m], float32 weight[m]',
    params: snapshot,
    query: throughView,
    status: 200,
    produces: NETWORK_TYPE,
  }),
  ties: operation({
    ...shared,
    id: 'exportTies',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/ties.csv',
    summary: 'Every tie as CSV: source, target, weight, kind, rows',
    params: snapshot,
    status: 200,
    produces: 'text/csv',
  }),
  gexf: operation({
    ...shared,
    id: 'exportGexf',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/network.gexf',
    summary: 'The network with every attribute as GEXF 1.3',
    params: snapshot,
    status: 200,
    produces: 'application/gexf+xml',
  }),
  graphml: operation({
    ...shared,
    id: 'exportGraphml',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/network.graphml',
    summary: 'The network with every attribute as GraphML',
    params: snapshot,
    status: 200,
    produces: 'application/graphml+xml',
  }),
  spectrum: operation({
    ...shared,
    id: 'getSpectrum',
    method: 'get',
    path: '/api/v1/snapshots/{snapshot}/spectrum',
    summary: 'Graph frequencies, ascending, with residuals',
    params: snapshot,
    query: z.object({
      laplacian: z.enum(['combinatorial', 'normalised', 'regularised']).default('combinatorial'),
      count: z.coerce.number().int().min(1).max(2000).default(20),
    }),
    status: 200,
    response: spectrumSchema,
  }),
};
