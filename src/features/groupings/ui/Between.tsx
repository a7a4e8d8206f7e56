import { Heatmap, SplitBar } from '@/components/charts';
import { Tag } from '@/components/ui';
import { groupColour } from '@/lib/groups';
import type { Group, GroupingView } from '../groupings';
import { groupTitle } from './words';

/** Most groups that the matrix shows beside the cards. */
const MOST = 12;

/** The pair of groups with the fewest ties between them that still has any: where the cloth is loosest. */
export function loosestSeam(view: GroupingView): [number, number] | null {
  let best: [number, number] | null = null;
  let least = Infinity;
  view.between.perThousand.forEach((row, a) =>
    row.forEach((value, b) => {
      if (b > a && value !== null && value > 0 && value < least) [best, least] = [[a, b], value];
    }),
  );
  return view.groups.filter((group) => !group.islet).length > 2 ? best : null;
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
        />
      </div>
      <p className="small mut" style={{ marginTop: 8 }}>
        Darker means more ties.{stitched.length > 0 && ' Stitched: the loosest seam.'}
        {view.groups.length > shown.length && ` The ${shown.length} largest groups are shown.`}
      </p>
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
