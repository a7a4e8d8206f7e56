import { Banner, Card, StatusBadge } from '@/components/ui';
import { formatCount, formatNumber } from '@/lib/format';
import { fates } from '../fates';
import type { Tried } from './try-sample';

/** What the choices make of the first rows, before anything is sent. */
export function Outcome({ tried }: { tried: Tried | string | null }) {
  if (tried === null)
    return (
      <Card>
        <p className="small mut">Add a file of ties to see what becomes of its rows.</p>
      </Card>
    );
  if (typeof tried === 'string') return <Banner tone="caution">{tried}</Banner>;
  const { kinds, total } = tried.problems;
  return (
    <>
      <Card title={tried.whole ? 'What it will become' : 'What the first rows become'} level={3}>
        <p className="small">
          <b>{formatCount(tried.members, 'member')}</b>, <b>{formatCount(tried.ties, 'tie')}</b>
        </p>
        <dl className="kv" style={{ marginTop: 8 }}>
          {fates(tried.counts).map(([label, value], i) => (
            <div key={i} className="row sp small">
              <dt>{label}</dt>
              <dd className="b">{formatNumber(value)}</dd>
            </div>
          ))}
        </dl>
      </Card>
      {total > 0 && (
        <section aria-labelledby="row-problems">
          <div className="row sp">
            <h2 className="h3" id="row-problems">
              Row problems
            </h2>
            <StatusBadge tone="madder">{formatCount(total, 'problem')}</StatusBadge>
          </div>
          <ul className="prob">
            {kinds.slice(0, 8).map((one) => (
              <li key={one.kind}>
                <div className="b small">
                  {formatNumber(one.count)} in {one.file}
                  {one.column === null ? '' : `, ${one.column}`}
                </div>
                <div className="small mut">
                  {one.reason} First in line {formatNumber(one.firstLine)}.
                </div>
              </li>
            ))}
          </ul>
        </section>
      )}
    </>
  );
}
