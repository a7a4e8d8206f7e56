import type { APIRoute } from 'astro';
import { accountOperations } from '@/features/account';
import { caseOperations } from '@/features/cases';
import { groupingOperations } from '@/features/groupings';
import { importOperations, recipeOperations } from '@/features/imports';
import { jobOperations } from '@/features/jobs';
import { memberOperations } from '@/features/members';
import { networkOperations } from '@/features/network';
import { readingOperations } from '@/features/readings';
import { viewOperations } from '@/features/views';
import { workspaceOperations } from '@/features/workspaces';
import { openApiDocument } from '@/lib/openapi';
import type { Operation } from '@/lib/operation';
import { VERSION } from '@/lib/version';

/** Every call of the API, in the order in which the document shows them. */
const OPERATIONS = [
  accountOperations,
  workspaceOperations,
  networkOperations,
  importOperations,
  recipeOperations,
  memberOperations,
  groupingOperations,
  readingOperations,
  caseOperations,
  viewOperations,
  jobOperations,
].flatMap((group) => Object.values(group)) as unknown as Operation[];

let document: object | undefined;

export const GET: APIRoute = () => {
  document ??= openApiDocument(OPERATIONS, VERSION);
  return Response.json(document, { headers: { 'cache-control': 'public, max-age=300' } });
};
