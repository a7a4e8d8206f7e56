import { Grouping } from '@/server/models';
import type { SharedSnapshot } from '@/features/views/index.server';

/** Groups of the asked groupings that are too small to show to this role, as `field → indexes`. */
export async function maskedGroups(
  { access, through }: SharedSnapshot,
  columns: readonly string[],
): Promise<Map<string, Set<number>>> {
  const masked = new Map<string, Set<number>>();
  if (!through) return masked;
  for (const field of columns.filter((one) => one.startsWith('group:'))) {
    const grouping = await Grouping.findByPk(field.slice(6));
    const groups = (grouping?.result as { groups?: { index: number; size: number }[] } | null)?.groups ?? [];
    const small = groups
      .filter((group) => group.size < access.workspace.smallestGroup)
      .map((group) => group.index);
    masked.set(field, new Set(small));
  }
  return masked;
}
