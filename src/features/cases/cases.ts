import * as z from 'zod';
import { idSchema } from '@/lib/ids';
import { operation } from '@/lib/operation';

export const DECISIONS = ['no-concern', 'keep-watching', 'reach-out', 'escalate', 'data-error'] as const;
export type Decision = (typeof DECISIONS)[number];

/** Accepts the words as people read them, too: "No concern" is `no-concern`. */
const decisionSchema = z
  .string()
  .transform((text) =>
    text
      .trim()
      .toLowerCase()
      .replaceAll(/[\s_]+/g, '-'),
  )
  .pipe(z.enum(DECISIONS));

export const CASE_STATES = ['open', 'watching', 'closed'] as const;

const person = z.object({ id: z.string(), name: z.string() });
const member = z.object({
  id: z.string(),
  externalId: z.string().nullable(),
  name: z.string().nullable(),
  code: z.string().nullable(),
});

/** What the reading said about the member when the case was opened; never changed afterwards. */
export const evidenceSchema = z.object({
  attribute: z.string(),
  value: z.number().nullable(),
  predicted: z.number().nullable(),
  departure: z.number().nullable(),
  z: z.number().nullable(),
  p: z.number().nullable(),
  q: z.number().nullable(),
  neighbours: z.int(),
  localMoran: z.object({
    z: z.number().nullable(),
    q: z.number().nullable(),
    quadrant: z.string().nullable(),
  }),
  threshold: z.number(),
});
export type Evidence = z.infer<typeof evidenceSchema>;

export const caseSchema = z
  .object({
    id: z.string(),
    number: z.int(),
    state: z.enum(CASE_STATES),
    member,
    communityId: z.string(),
    snapshotId: z.string(),
    readingId: z.string(),
    attribute: z.string(),
    departure: z.number().nullable(),
    q: z.number().nullable(),
    assignee: person.nullable(),
    priority: z.enum(['low', 'normal', 'high']),
    dueOn: z.string().nullable(),
    decision: z.enum(DECISIONS).nullable(),
    reason: z.string().nullable(),
    escalationBy: person.nullable(),
    version: z.int(),
    createdAt: z.string(),
    href: z.string(),
  })
  .meta({ id: 'Case' });
export type CaseView = z.infer<typeof caseSchema>;

export const caseEventSchema = z
  .object({
    id: z.string(),
    kind: z.enum(['opened', 'assigned', 'changed', 'note', 'decision', 'escalation-proposed', 'reopened']),
    actor: person.nullable(),
    body: z.record(z.string(), z.unknown()),
    createdAt: z.string(),
  })
  .meta({ id: 'CaseEvent' });
export type CaseEventView = z.infer<typeof caseEventSchema>;

export const caseDetailSchema = caseSchema.extend({
  evidence: evidenceSchema,
  /** Present scores around the member, from the reading of the case. */
  neighbourhood: z.object({
    sigma: z.number().nullable(),
    items: z.array(
      member.extend({
        value: z.number().nullable(),
        smoothed: z.number().nullable(),
        weight: z.number(),
        ordinal: z.int(),
      }),
    ),
    /** Ties among the neighbours, by their place in `items`. */
    between: z.array(z.tuple([z.int(), z.int()])),
  }),
  history: z.array(
    z.object({
      snapshotId: z.string(),
      takenOn: z.string(),
      value: z.number().nullable(),
      predicted: z.number().nullable(),
      half: z.number().nullable(),
    }),
  ),
  others: z.array(
    z.object({
      attribute: z.string(),
      value: z.number().nullable(),
      departure: z.number().nullable(),
      readingId: z.string().nullable(),
    }),
  ),
  events: z.array(caseEventSchema),
  abilities: z.object({ work: z.boolean() }),
});
export type CaseDetail = z.infer<typeof caseDetailSchema>;

export const openCasesSchema = z.object({
  preview: z.boolean().default(false),
  /** Largest false-discovery rate of a member to be reviewed. */
  threshold: z.number().gt(0).max(0.5).default(0.1),
  /** Only these members, each still past the threshold. */
  members: z.array(idSchema).max(1000).optional(),
});

export const casesPreviewSchema = z.object({
  preview: z.literal(true),
  threshold: z.number(),
  count: z.int(),
  expectedFalse: z.number(),
  alreadyOpen: z.int(),
  leftOut: z.object({ tooFewNeighbours: z.int(), noScore: z.int() }),
});
export type CasesPreview = z.infer<typeof casesPreviewSchema>;

const version = z.int();
const text = z.string().trim().min(1).max(10_000);
const reason = z.string().trim().min(10, 'Say in a sentence what you looked at and why.').max(10_000);
const one = z.object({ case: idSchema });
const shared = { tag: 'Cases', access: 'person' } as const;

export const casesQuerySchema = z.object({
  state: z.enum([...CASE_STATES, 'any']).default('open'),
  assignee: z.union([z.literal('me'), z.literal('nobody'), z.string().max(100)]).optional(),
  community: idSchema.optional(),
  limit: z.coerce.number().int().min(1).max(200).default(50),
  cursor: z.string().max(40).optional(),
});

export const changeCaseSchema = z.object({
  version,
  assigneeId: z.string().max(100).nullable().optional(),
  priority: z.enum(['low', 'normal', 'high']).optional(),
  dueOn: z.iso.date().nullable().optional(),
});
export const decideSchema = z.object({
  version: version.optional(),
  decision: decisionSchema,
  reason,
  lookAgainOn: z.iso.date().nullable().default(null),
});
export const noteSchema = z.object({ body: text });
export const reopenSchema = z.object({ version: version.optional(), reason });

export const caseOperations = {
  open: operation({
    ...shared,
    id: 'openCases',
    method: 'post',
    path: '/api/v1/readings/{reading}/cases',
    summary: 'Open cases for members past the threshold, or preview how many',
    params: z.object({ reading: idSchema }),
    query: z.object({ preview: z.enum(['true', 'false']).optional() }),
    body: openCasesSchema,
    status: 201,
    response: z.union([casesPreviewSchema, z.object({ items: z.array(caseSchema) })]),
  }),
  list: operation({
    ...shared,
    id: 'listCases',
    method: 'get',
    path: '/api/v1/workspaces/{workspace}/cases',
    summary: 'Cases of a workspace',
    params: z.object({ workspace: idSchema }),
    query: casesQuerySchema,
    status: 200,
    response: z.object({ items: z.array(caseSchema), total: z.int(), nextCursor: z.string().nullable() }),
  }),
  get: operation({
    ...shared,
    id: 'getCase',
    method: 'get',
    path: '/api/v1/cases/{case}',
    summary: 'One case with its evidence and log',
    params: one,
    status: 200,
    response: caseDetailSchema,
  }),
  change: operation({
    ...shared,
    id: 'changeCase',
    method: 'patch',
    path: '/api/v1/cases/{case}',
    summary: 'Assign, prioritise, set a date; 409 when somebody was faster',
    params: one,
    body: changeCaseSchema,
    status: 200,
    response: caseDetailSchema,
  }),
  note: operation({
    ...shared,
    id: 'addNote',
    method: 'post',
    path: '/api/v1/cases/{case}/notes',
    summary: 'Add a note',
    params: one,
    body: noteSchema,
    status: 201,
    response: caseDetailSchema,
  }),
  decide: operation({
    ...shared,
    id: 'decideCase',
    method: 'post',
    path: '/api/v1/cases/{case}/decisions',
    summary: 'Record a decision with its reason; escalating needs a second person',
    params: one,
    body: decideSchema,
    status: 201,
    response: caseDetailSchema,
  }),
  reopen: operation({
    ...shared,
    id: 'reopenCase',
    method: 'post',
    path: '/api/v1/cases/{case}/reopen',
    summary: 'Reopen a decided case',
    params: one,
    body: reopenSchema,
    status: 200,
    response: caseDetailSchema,
  }),
};
