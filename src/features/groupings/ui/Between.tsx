import { Heatmap, RampLegend, SplitBar } from '@/components/charts';
import { Tag } from '@/components/ui';
import { formatNumber } from '@/lib/format';
import { groupColour } from '@/lib/groups';
import type { Group, GroupingView } from '../groupings';
import { groupTitle } from './words';

/** Most groups that the matrix shows beside the cards. */
const MOST = 12;

/**
 * Where the cloth is loosest: the group with the lowest conductance, and the group that it hangs on by most ties.
 * Null for two groups (there is only the one seam) and where nothing crosses.
 */
export function loosestSeam(view: GroupingView): [number, number] | null {
  const cut = view.groups.filter(
    (group) => !group.islet && group.conductance !== null && group.conductance > 0,
  );
  if (cut.length < 3) return null;
  const { index } = cut.reduce((a, b) => (b.conductance! < a.conductance! ? b : a));
  const row = view.between.weights[index] ?? [];
  let other = -1;
  row.forEach((weight, b) => {
    if (b !== index && weight > 0 && (other < 0 || weight > row[other]!)) other = b;
  });
  return other < 0 ? null : [index, other];
}

/** How densely groups are tied, inside and between. */
export function TiesBetween({ view }: { view: GroupingView }) {
  const shown = view.groups.filter((group) => group.index < view.between.perThousand.length).slice(0, MOST);
  const seam = loosestSeam(view);
  const place = new Map(shown.map((group, index) => [group.index, index]));
  const a = seam && place.get(seam[0]);
  const b = seam && place.get(seam[1]);
  const stitched =
    typeof a === 'number' && typeof b === 'number'
      ? ([
          [a, b],
          [b, a],
        ] as const)
      : ([] as const);
  return (
    <section className="card p" style={{ padding: '12px 16px 14px' }}>
      <div className="row sp wrap" style={{ marginBottom: 8 }}>
        <h2 className="h3">Ties between groups</h2>
        <span className="small mut">per 1,000 possible pairs</span>
      </div>
      <div className="tscroll">
        <Heatmap
          label="Ties between groups, per 1,000 possible pairs"
          rows={shown.map((group) => ({
            key: group.letter,
            name: groupTitle(group),
            head: <Tag letter={group.letter} name={groupTitle(group)} />,
          }))}
          values={shown.map((row) =>
            shown.map((column) => view.between.perThousand[row.index]?.[column.index] ?? null),
          )}
          stitched={stitched}
          format={(value) => formatNumber(value, value < 0.1 ? 2 : value < 10 ? 1 : 0)}
        />
      </div>
      <div style={{ marginTop: 10 }}>
        <RampLegend
          kind="sequential"
          low="Few"
          middle={stitched.length > 0 ? 'Stitched: the loosest seam' : undefined}
          high="Many"
        />
      </div>
      {view.groups.length > shown.length && (
        <p className="small mut">{`The ${shown.length} largest groups are shown.`}</p>
      )}
    </section>
  );
}

const fill = (group: Group | undefined): string => {
  const colour = group && groupColour(group.letter);
  return colour ? `var(${colour.fill})` : 'var(--c-line-strong)';
};

/** Members who hold two groups together. */
export function BoundaryMembers({ view, all }: { view: GroupingView; all: string }) {
  const groupOf = new Map(view.groups.map((group) => [group.index, group]));
  const shown = view.boundary.slice(0, 8);
  return (
    <section className="card p" style={{ padding: '12px 16px 6px' }}>
      <div className="row sp">
        <h2 className="h3">Boundary members</h2>
        <a className="small" href={all}>
          See all members
        </a>
      </div>
      <p className="small mut">
        {shown.length > 0
          ? 'They hold two groups together. Ties on each side:'
          : 'Nobody has ties on both sides of a seam.'}
      </p>
      <ul className="bd" style={{ listStyle: 'none', padding: 0 }}>
        {shown.map((member) => {
          const own = groupOf.get(member.group);
          const other = groupOf.get(member.other);
          return (
            <li key={member.id}>
              <span className="row" style={{ minWidth: 0 }}>
                <Tag letter={own?.letter ?? '?'} name={own && groupTitle(own)} />
                <b className="nw">{member.name ?? member.code}</b>
              </span>
              <span className="row" style={{ gap: 6 }}>
                <b className="r" style={{ minWidth: 22 }}>
                  {member.inside}
                </b>
                <span className="grow">
                  <SplitBar left={member.inside} right={member.across} colours={[fill(own), fill(other)]} />
                </span>
                <b style={{ minWidth: 22 }}>{member.across}</b>
              </span>
              <Tag letter={other?.letter ?? '?'} name={other && groupTitle(other)} />
            </li>
          );
        })}
      </ul>
    </section>
  );
}
