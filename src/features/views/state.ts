import * as z from 'zod';
import { idSchema } from '@/lib/ids';

/**
 * Names of a number or label of a member, as used by filters, columns, sort and colour:
 * `degree`, `strength`, `attribute:<id>`, `smoothed:<reading>`, `departure:<reading>`, `z:<reading>`, `q:<reading>`,
 * `group:<grouping>`.
 */
const UUID = '[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}';
export const FIELD_PATTERN = new RegExp(
  `^(degree|strength|name|(attribute|smoothed|departure|z|q|group):${UUID})$`,
);
export const fieldSchema = z.string().regex(FIELD_PATTERN, 'Not a known field.');

export const filterSchema = z.discriminatedUnion('kind', [
  /** Members whose value lies in [low, high]; an open end is null. Members without a value are outside. */
  z.object({
    kind: z.literal('range'),
    field: fieldSchema,
    low: z.number().nullable(),
    high: z.number().nullable(),
  }),
  z.object({ kind: z.literal('group'), grouping: idSchema, groups: z.array(z.int().min(0)).min(1).max(200) }),
  z.object({
    kind: z.literal('label'),
    attribute: idSchema,
    labels: z.array(z.string().max(200)).min(1).max(200),
  }),
  z.object({ kind: z.literal('missing'), field: fieldSchema, missing: z.boolean() }),
  z.object({ kind: z.literal('search'), text: z.string().trim().min(1).max(100) }),
  /** The member itself and everyone within `steps` ties. */
  z.object({ kind: z.literal('near'), member: idSchema, steps: z.int().min(1).max(3) }),
  z.object({ kind: z.literal('members'), members: z.array(idSchema).min(1).max(1000) }),
]);
export type Filter = z.infer<typeof filterSchema>;
export const filtersSchema = z.array(filterSchema).max(20);

export const colourSchema = z.object({
  by: z.enum(['plain', 'attribute', 'smoothed', 'departure', 'group']),
  /** Attribute, reading or grouping that `by` needs. */
  of: idSchema.nullable(),
});
export type Colour = z.infer<typeof colourSchema>;

/** A whole state of the Map and the Members table: what the address holds and what a saved view keeps. */
export const viewStateSchema = z.object({
  colour: colourSchema.default({ by: 'plain', of: null }),
  size: z.enum(['same', 'degree', 'strength']).default('degree'),
  /** Grouping whose seams and letters are drawn. */
  seams: idSchema.nullable().default(null),
  filters: filtersSchema.default([]),
  camera: z.object({ x: z.number(), y: z.number(), ratio: z.number().positive() }).nullable().default(null),
  selection: z.array(idSchema).max(1000).default([]),
  columns: z.array(fieldSchema).max(40).default([]),
  sort: z.object({ field: fieldSchema, descending: z.boolean() }).nullable().default(null),
  display: z.enum(['map', 'list']).default('map'),
});
export type ViewState = z.infer<typeof viewStateSchema>;

/** Fields that a state shows or filters by: all that a shared view lets a viewer see. */
export function fieldsOf(state: ViewState): Set<string> {
  const fields = new Set<string>(['degree', ...state.columns]);
  if (state.colour.of) {
    if (state.colour.by === 'group') fields.add(`group:${state.colour.of}`);
    if (state.colour.by === 'attribute') fields.add(`attribute:${state.colour.of}`);
    if (state.colour.by === 'smoothed' || state.colour.by === 'departure')
      fields.add(`${state.colour.by}:${state.colour.of}`);
  }
  if (state.seams) fields.add(`group:${state.seams}`);
  if (state.size === 'strength') fields.add('strength');
  if (state.sort) fields.add(state.sort.field);
  for (const filter of state.filters) {
    if (filter.kind === 'range' || filter.kind === 'missing') fields.add(filter.field);
    if (filter.kind === 'group') fields.add(`group:${filter.grouping}`);
    if (filter.kind === 'label') fields.add(`attribute:${filter.attribute}`);
  }
  fields.delete('name');
  return fields;
}

/** State to query string and back, so that an address opens the exact state. Unknown or damaged parts are left out. */
export const stateToQuery = (state: ViewState): string => encodeURIComponent(JSON.stringify(state));
export function stateFromQuery(text: string | null): ViewState {
  const empty = viewStateSchema.parse({});
  if (!text) return empty;
  try {
    const parsed = viewStateSchema.safeParse(JSON.parse(text));
    return parsed.success ? parsed.data : empty;
  } catch {
    return empty;
  }
}
