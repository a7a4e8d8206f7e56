import * as z from 'zod';
import { ROLES } from '@/lib/actor';
import { operation } from '@/lib/operation';

export const meSchema = z
  .object({
    id: z.string(),
    name: z.string(),
    email: z.string(),
    via: z.enum(['session', 'token']),
    workspaces: z.array(
      z.object({ id: z.string(), name: z.string(), role: z.enum(ROLES), abilities: z.array(z.string()) }),
    ),
  })
  .meta({ id: 'Me' });
export type Me = z.infer<typeof meSchema>;

export const accountOperations = {
  me: operation({
    id: 'getMe',
    method: 'get',
    path: '/api/v1/me',
    summary: 'Who am I, my workspaces and roles',
    tag: 'Account',
    access: 'person',
    status: 200,
    response: meSchema,
  }),
};
