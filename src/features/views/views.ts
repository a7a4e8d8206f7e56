import * as z from 'zod';
import { ROLES } from '@/lib/actor';
import { idSchema } from '@/lib/ids';
import { operation } from '@/lib/operation';
import { viewStateSchema } from './state';

export const PLACES = ['map', 'members'] as const;

export const viewSchema = z
  .object({
    id: z.string(),
    communityId: z.string(),
    snapshotId: z.string().nullable(),
    name: z.string(),
    note: z.string(),
    place: z.enum(PLACES),
    state: viewStateSchema,
    visibility: z.enum(['private', 'workspace']),
    pinned: z.boolean(),
    version: z.int(),
    owner: z.object({ id: z.string(), name: z.string() }),
    shares: z.int(),
    mine: z.boolean(),
    canEdit: z.boolean(),
    canShare: z.boolean(),
    href: z.string(),
    updatedAt: z.string(),
  })
  .meta({ id: 'SavedView' });
export type SavedView = z.infer<typeof viewSchema>;

const name = z.string().trim().min(1, 'Give the view a name.').max(120);
const note = z.string().max(2000);

export const newViewSchema = z.object({
  name,
  note: note.default(''),
  place: z.enum(PLACES),
  snapshotId: idSchema,
  state: viewStateSchema,
  visibility: z.enum(['private', 'workspace']).default('private'),
});

export const changeViewSchema = z.object({
  /** The version that the person saw; a newer one on the server is a conflict. */
  version: z.int(),
  name: name.optional(),
  note: note.optional(),
  state: viewStateSchema.optional(),
  visibility: z.enum(['private', 'workspace']).optional(),
  pinned: z.boolean().optional(),
});

export const shareSchema = z
  .object({
    id: z.string(),
    userId: z.string().nullable(),
    role: z.enum(ROLES).nullable(),
    name: z.string(),
    canEdit: z.boolean(),
  })
  .meta({ id: 'Share' });
export type Share = z.infer<typeof shareSchema>;

export const newShareSchema = z
  .object({
    userId: z.string().max(100).optional(),
    role: z.enum(ROLES).optional(),
    canEdit: z.boolean().default(false),
  })
  .refine((share) => (share.userId === undefined) !== (share.role === undefined), 'Name a person or a role.');

export const commentSchema = z
  .object({
    id: z.string(),
    author: z.object({ id: z.string(), name: z.string() }),
    body: z.string(),
    createdAt: z.string(),
  })
  .meta({ id: 'Comment' });
export type Comment = z.infer<typeof commentSchema>;

const community = z.object({ community: idSchema });
const view = z.object({ view: idSchema });
const shared = { tag: 'Saved views', access: 'person' } as const;

export const viewOperations = {
  list: operation({
    ...shared,
    id: 'listViews',
    method: 'get',
    path: '/api/v1/communities/{community}/views',
    summary: 'Saved views that you may open',
    params: community,
    status: 200,
    response: z.object({ items: z.array(viewSchema) }),
  }),
  create: operation({
    ...shared,
    id: 'createView',
    method: 'post',
    path: '/api/v1/communities/{community}/views',
    summary: 'Save a view',
    params: community,
    body: newViewSchema,
    status: 201,
    response: viewSchema,
  }),
  get: operation({
    ...shared,
    id: 'getView',
    method: 'get',
    path: '/api/v1/views/{view}',
    summary: 'One saved view',
    params: view,
    status: 200,
    response: viewSchema,
  }),
  change: operation({
    ...shared,
    id: 'changeView',
    method: 'patch',
    path: '/api/v1/views/{view}',
    summary: 'Change a saved view; 409 when somebody else was faster',
    params: view,
    body: changeViewSchema,
    status: 200,
    response: viewSchema,
  }),
  remove: operation({
    ...shared,
    id: 'deleteView',
    method: 'delete',
    path: '/api/v1/views/{view}',
    summary: 'Delete a saved view',
    params: view,
    status: 204,
  }),
  shares: operation({
    ...shared,
    id: 'listShares',
    method: 'get',
    path: '/api/v1/views/{view}/shares',
    summary: 'Who a view is shared with',
    params: view,
    status: 200,
    response: z.object({ items: z.array(shareSchema) }),
  }),
  share: operation({
    ...shared,
    id: 'shareView',
    method: 'post',
    path: '/api/v1/views/{view}/shares',
    summary: 'Share a view with a person or a role',
    params: view,
    body: newShareSchema,
    status: 201,
    response: shareSchema,
  }),
  unshare: operation({
    ...shared,
    id: 'endShare',
    method: 'delete',
    path: '/api/v1/views/{view}/shares/{share}',
    summary: 'End a share',
    params: z.object({ view: idSchema, share: idSchema }),
    status: 204,
  }),
  comments: operation({
    ...shared,
    id: 'listComments',
    method: 'get',
    path: '/api/v1/views/{view}/comments',
    summary: 'Comments on a view',
    params: view,
    status: 200,
    response: z.object({ items: z.array(commentSchema) }),
  }),
  comment: operation({
    ...shared,
    id: 'addComment',
    method: 'post',
    path: '/api/v1/views/{view}/comments',
    summary: 'Comment on a view',
    params: view,
    body: z.object({ body: z.string().trim().min(1).max(4000) }),
    status: 201,
    response: commentSchema,
  }),
};
