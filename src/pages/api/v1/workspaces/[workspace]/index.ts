import { workspaceOperations } from '@/features/workspaces';
import { changeSettings, getSettings } from '@/features/workspaces/index.server';
import { serve } from '@/server/http';

export const GET = serve(workspaceOperations.settings, (actor, { params }) =>
  getSettings(actor, params.workspace),
);

export const PATCH = serve(workspaceOperations.changeSettings, (actor, { params, body }) =>
  changeSettings(actor, params.workspace, body),
);
