import type { CleanedWhere } from '@better-auth/core/db/adapter';
import { col, fn, Op, where as compare, type WhereOptions } from 'sequelize';

/** `%`, `_` and `\` of a value are themselves, not wildcards. */
const literal = (value: unknown): string => String(value).replaceAll(/[\\%_]/g, (sign) => `\\${sign}`);

const lower = (value: unknown): unknown => (typeof value === 'string' ? value.toLowerCase() : value);

/** One clause of better-auth as a Sequelize condition. Fields arrive as column names. */
function clause({ field, operator, value, mode }: CleanedWhere, model: string): WhereOptions {
  const insensitive = mode === 'insensitive';
  const like = insensitive ? Op.iLike : Op.like;
  const on = (condition: object): WhereOptions => ({ [field]: condition });
  switch (operator) {
    case 'in':
    case 'not_in': {
      const values = Array.isArray(value) ? (value as unknown[]) : [value];
      const op = operator === 'in' ? Op.in : Op.notIn;
      if (!insensitive) return on({ [op]: values });
      return compare(fn('lower', col(`${model}.${field}`)), {
        [op]: values.map(lower),
      }) as unknown as WhereOptions;
    }
    case 'contains':
      return on({ [like]: `%${literal(value)}%` });
    case 'starts_with':
      return on({ [like]: `${literal(value)}%` });
    case 'ends_with':
      return on({ [like]: `%${literal(value)}` });
    case 'ne':
      if (value === null) return on({ [Op.not]: null });
      return insensitive && typeof value === 'string'
        ? on({ [Op.notILike]: literal(value) })
        : on({ [Op.ne]: value });
    case 'lt':
      return on({ [Op.lt]: value });
    case 'lte':
      return on({ [Op.lte]: value });
    case 'gt':
      return on({ [Op.gt]: value });
    case 'gte':
      return on({ [Op.gte]: value });
    default:
      if (value === null) return on({ [Op.is]: null });
      return insensitive && typeof value === 'string'
        ? on({ [Op.iLike]: literal(value) })
        : on({ [Op.eq]: value });
  }
}

/** All clauses joined by AND, and one of those joined by OR. */
export function toWhere(clauses: readonly CleanedWhere[] | undefined, model: string): WhereOptions {
  const list = clauses ?? [];
  const all = list.filter((one) => one.connector !== 'OR').map((one) => clause(one, model));
  const any = list.filter((one) => one.connector === 'OR').map((one) => clause(one, model));
  const parts = [...all, ...(any.length > 0 ? [{ [Op.or]: any }] : [])];
  return parts.length > 0 ? { [Op.and]: parts } : {};
}
