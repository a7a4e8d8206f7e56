import { Bar, DivergingBar } from '@/components/charts';
import { Button, Tag } from '@/components/ui';
import { formatCount, formatNumber, formatPercent } from '@/lib/format';
import type { Group } from '../groupings';
import { groupTitle } from './words';

/** Beyond this many standard deviations a profile bar is full. */
const MOST = 1.5;
const ATTRIBUTES = 5;

interface CardsProps {
  groups: readonly Group[];
  /** The group that holds on by the weakest seam. */
  loosest: number | null;
  onSplit?: ((group: Group) => void) | undefined;
}

export function GroupCards({ groups, loosest, onSplit }: CardsProps) {
  const full = Math.max(0.25, ...groups.map((group) => group.leaving ?? 0));
  return (
    <div className="gcards">
      {groups.map((group) => (
        <GroupCard
          key={group.index}
          group={group}
          on={group.index === loosest}
          full={full}
          onSplit={onSplit}
        />
      ))}
    </div>
  );
}

function GroupCard({
  group,
  on,
  full,
  onSplit,
}: {
  group: Group;
  on: boolean;
  /** Share of ties leaving that fills the bar. */
  full: number;
  onSplit?: ((group: Group) => void) | undefined;
}) {
  const title = groupTitle(group);
  return (
    <article className={on ? 'gcd on' : 'gcd'} aria-label={title}>
      <div>
        <div className="row">
          <Tag letter={group.letter} size="large" />
          <div className="grow">
            <h2 className="h4" style={{ fontSize: 15 }}>
              {title}
            </h2>
            <div className="small mut">
              {formatCount(group.size, 'member')}
              {group.islet && ', an islet'}
            </div>
          </div>
        </div>
        <div className="row sp small" style={{ marginTop: 9 }}>
          <span className="mut">Ties leaving</span>
          <b>{formatPercent(group.leaving)}</b>
        </div>
        <div style={{ marginTop: 3 }}>
          <Bar share={(group.leaving ?? 0) / full} />
        </div>
        <div className="row sp small" style={{ marginTop: 6 }}>
          <span className="mut">Conductance</span>
          <span>{group.conductance === null ? '–' : formatNumber(group.conductance, 3)}</span>
        </div>
      </div>
      <div className="pf">
        {group.profile.slice(0, ATTRIBUTES).map((entry) => (
          <div
            key={entry.attribute}
            title={`${entry.attribute}: ${formatNumber(entry.difference, 2)} ± ${formatNumber(1.96 * entry.error, 2)} standard deviations from the mean of all`}
          >
            <span>{entry.attribute}</span>
            <DivergingBar value={entry.difference} most={MOST} width={68} />
            <span className="vh">{`${formatNumber(entry.difference, 1)} standard deviations`}</span>
          </div>
        ))}
        {onSplit && group.size >= 10 && (
          <div style={{ display: 'flex', justifyContent: 'flex-end', marginTop: 4 }}>
            <Button kind="quiet" size="small" aria-label={`Split ${title}`} onClick={() => onSplit(group)}>
              Split
            </Button>
          </div>
        )}
      </div>
    </article>
  );
}

/** The same as a table. */
export function GroupTable({ groups }: { groups: readonly Group[] }) {
  return (
    <div className="card tscroll" tabIndex={0} role="region" aria-label="Groups as a table">
      <table className="tbl">
        <thead>
          <tr>
            <th scope="col">Group</th>
            <th scope="col" className="r">
              Members
            </th>
            <th scope="col" className="r">
              Ties leaving
            </th>
            <th scope="col" className="r">
              Weight cut
            </th>
            <th scope="col" className="r">
              Conductance
            </th>
            <th scope="col" className="r">
              Density inside
            </th>
          </tr>
        </thead>
        <tbody>
          {groups.map((group) => (
            <tr key={group.index}>
              <th scope="row">
                <span className="row">
                  <Tag letter={group.letter} />
                  {groupTitle(group)}
                  {group.islet && <span className="mut">islet</span>}
                </span>
              </th>
              <td className="r">{formatNumber(group.size)}</td>
              <td className="r">{formatPercent(group.leaving)}</td>
              <td className="r">{formatNumber(group.cut)}</td>
              <td className="r">{formatNumber(group.conductance, 4)}</td>
              <td className="r">{formatNumber(group.density, 4)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
