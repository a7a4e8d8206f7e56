import * as z from 'zod';
import { ROLES } from '@/lib/actor';
import { idSchema } from '@/lib/ids';
import { operation } from '@/lib/operation';

const role = z.enum(ROLES);
export const personSchema = z
  .object({
    id: z.string(),
    name: z.string(),
    email: z.string(),
    role,
    lastSeenAt: z.string().nullable(),
    me: z.boolean(),
  })
  .meta({ id: 'Person' });
export type Person = z.infer<typeof personSchema>;

export const invitationSchema = z
  .object({ id: z.string(), email: z.string(), role, invitedAt: z.string(), expiresAt: z.string() })
  .meta({ id: 'Invitation' });
export type InvitationView = z.infer<typeof invitationSchema>;

export const tokenSchema = z
  .object({
    id: z.string(),
    name: z.string(),
    readOnly: z.boolean(),
    person: z.string(),
    createdAt: z.string(),
    expiresAt: z.string(),
    lastUsedAt: z.string().nullable(),
  })
  .meta({ id: 'Token' });
export type TokenView = z.infer<typeof tokenSchema>;

export const auditSchema = z
  .object({
    id: z.string(),
    at: z.string(),
    actor: z.string().nullable(),
    action: z.string(),
    targetKind: z.string(),
    targetId: z.string().nullable(),
    detail: z.record(z.string(), z.unknown()),
  })
  .meta({ id: 'AuditEntry' });
export type AuditView = z.infer<typeof auditSchema>;

export const settingsSchema = z
  .object({
    name: z.string().trim().min(1).max(120),
    viewersSeeNames: z.boolean(),
    smallestGroup: z.int().min(2).max(100),
    neighbourFloor: z.int().min(1).max(100),
  })
  .meta({ id: 'WorkspaceSettings' });
export type WorkspaceSettings = z.infer<typeof settingsSchema>;

export const newInvitationSchema = z.object({
  email: z.email('This is not an e-mail address.').max(200),
  role: z.enum(['admin', 'analyst', 'moderator', 'viewer']),
});
export const newTokenSchema = z.object({
  name: z.string().trim().min(1).max(80),
  readOnly: z.boolean().default(true),
  days: z.int().min(1).max(365).default(90),
});

const params = z.object({ workspace: idSchema });
const personId = z.string().min(1).max(100);
const shared = { tag: 'Workspace', access: 'person' } as const;
const base = '/api/v1/workspaces/{workspace}' as const;

export const workspaceOperations = {
  settings: operation({
    ...shared,
    id: 'getWorkspace',
    method: 'get',
    path: base,
    summary: 'Settings of a workspace',
    params,
    status: 200,
    response: settingsSchema,
  }),
  changeSettings: operation({
    ...shared,
    id: 'changeWorkspace',
    method: 'patch',
    path: base,
    summary: 'Change settings',
    params,
    body: settingsSchema.partial(),
    status: 200,
    response: settingsSchema,
  }),
  people: operation({
    ...shared,
    id: 'listPeople',
    method: 'get',
    path: `${base}/people`,
    summary: 'People and roles',
    params,
    status: 200,
    response: z.object({ items: z.array(personSchema) }),
  }),
  changeRole: operation({
    ...shared,
    id: 'changeRole',
    method: 'patch',
    path: `${base}/people/{person}`,
    summary: 'Change a role',
    params: params.extend({ person: personId }),
    body: z.object({ role }),
    status: 200,
    response: personSchema,
  }),
  remove: operation({
    ...shared,
    id: 'removePerson',
    method: 'delete',
    path: `${base}/people/{person}`,
    summary: 'Remove a person from the workspace',
    params: params.extend({ person: personId }),
    status: 204,
  }),
  invitations: operation({
    ...shared,
    id: 'listInvitations',
    method: 'get',
    path: `${base}/invitations`,
    summary: 'Invitations that wait',
    params,
    status: 200,
    response: z.object({ items: z.array(invitationSchema) }),
  }),
  invite: operation({
    ...shared,
    id: 'invite',
    method: 'post',
    path: `${base}/invitations`,
    summary: 'Invite by e-mail; again for the same address sends a new link',
    params,
    body: newInvitationSchema,
    status: 201,
    response: invitationSchema,
  }),
  revoke: operation({
    ...shared,
    id: 'revokeInvitation',
    method: 'delete',
    path: `${base}/invitations/{invitation}`,
    summary: 'Revoke an invitation',
    params: params.extend({ invitation: idSchema }),
    status: 204,
  }),
  tokens: operation({
    ...shared,
    id: 'listTokens',
    method: 'get',
    path: `${base}/tokens`,
    summary: 'Own API tokens; all of them for admins',
    params,
    status: 200,
    response: z.object({ items: z.array(tokenSchema) }),
  }),
  createToken: operation({
    ...shared,
    id: 'createToken',
    method: 'post',
    path: `${base}/tokens`,
    summary: 'Make an API token; shown once',
    params,
    body: newTokenSchema,
    status: 201,
    response: tokenSchema.extend({ token: z.string() }),
  }),
  revokeToken: operation({
    ...shared,
    id: 'revokeToken',
    method: 'delete',
    path: `${base}/tokens/{token}`,
    summary: 'Revoke a token',
    params: params.extend({ token: idSchema }),
    status: 204,
  }),
  audit: operation({
    ...shared,
    id: 'listAudit',
    method: 'get',
    path: `${base}/audit`,
    summary: 'Who did what, newest first',
    params,
    query: z.object({
      limit: z.coerce.number().int().min(1).max(500).default(100),
      cursor: z.string().max(60).optional(),
    }),
    status: 200,
    response: z.object({ items: z.array(auditSchema), nextCursor: z.string().nullable() }),
  }),
};
