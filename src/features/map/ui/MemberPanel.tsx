import { useQuery } from '@tanstack/react-query';
import { StripPlot } from '@/components/charts';
import { ErrorState, IconButton, Skeleton, Tag } from '@/components/ui';
import type { MemberDetail } from '@/features/members';
import { formatChance, formatDeparture, formatNumber } from '@/lib/format';
import { memberQuery } from '../data';
import type { ExploreProps, ExploreReading } from '@/features/views';

interface PanelProps {
  readonly props: ExploreProps;
  readonly member: string;
  readonly viewId?: string;
  onOpen(member: string | null): void;
}

const number = (value: unknown): number | null => (typeof value === 'number' ? value : null);

/** What the panel asks of a member: a shared view lets through only its own fields. */
function columnsFor(props: ExploreProps): string[] {
  if (!props.abilities.includes('explore.open')) return [];
  const reading = props.readings[0];
  const seams = props.groupings[0];
  return [
    ...props.attributes.filter((one) => one.type === 'number').map((one) => `attribute:${one.id}`),
    ...(reading ? [`smoothed:${reading.id}`, `departure:${reading.id}`, `q:${reading.id}`] : []),
    ...(seams ? [`group:${seams.id}`] : []),
  ];
}

/** One member beside the picture: score against neighbours, attributes, ties. */
export function MemberPanel({ props, member, viewId, onOpen }: PanelProps) {
  const columns = columnsFor(props);
  const detail = useQuery(memberQuery(props.snapshot.id, member, columns, viewId));
  const reading = props.readings[0];
  return (
    <aside className="panel" aria-label="Selected member">
      {detail.error && <ErrorState title="This member could not be shown" detail={detail.error.message} />}
      {!detail.data && !detail.error && <Skeleton height={180} />}
      {detail.data && <PanelBody props={props} detail={detail.data} reading={reading} onOpen={onOpen} />}
    </aside>
  );
}

function PanelBody({
  props,
  detail,
  reading,
  onOpen,
}: {
  props: ExploreProps;
  detail: MemberDetail;
  reading: ExploreReading | undefined;
  onOpen: PanelProps['onOpen'];
}) {
  const { member, neighbours } = detail;
  const name = member.name ?? member.code ?? 'Member';
  const grouping = props.groupings[0];
  const groupOf = (values: MemberDetail['member']['values']) =>
    grouping?.groups.find((one) => one.index === values[`group:${grouping.id}`]);
  const group = groupOf(member.values);
  const q = reading ? number(member.values[`q:${reading.id}`]) : null;
  return (
    <>
      <div className="row sp">
        <div className="row">
          {group && <Tag letter={group.letter} size="large" />}
          <div>
            <h2 className="h3">{name}</h2>
            <div className="small mut">
              {[group?.name, `${formatNumber(detail.degree)} ties`].filter(Boolean).join(' · ')}
            </div>
          </div>
        </div>
        <IconButton icon="close" size="small" kind="quiet" label="Close panel" onClick={() => onOpen(null)} />
      </div>
      {reading && <Against props={props} detail={detail} reading={reading} name={name} />}
      {q !== null && q <= 0.1 && (
        <p className="small ink2">A departure is a reason to look, not a finding.</p>
      )}
      {props.attributes.some((one) => `attribute:${one.id}` in member.values) && (
        <>
          <hr className="seamline q" />
          <div>
            <div className="row sp micro mut">
              <span>Attribute</span>
              <span>Recorded</span>
            </div>
            {props.attributes
              .filter((one) => one.type === 'number')
              .map((one) => (
                <div className="avrow two" key={one.id}>
                  <span>{one.name}</span>
                  <b className="r">{formatNumber(number(member.values[`attribute:${one.id}`]))}</b>
                </div>
              ))}
          </div>
        </>
      )}
      <hr className="seamline q" />
      <div>
        <div className="row sp">
          <h3 className="h4">Ties</h3>
          <span className="small mut">{formatNumber(detail.degree)} · strongest first</span>
        </div>
        <ul className="ties">
          {neighbours.slice(0, 24).map((one) => (
            <li key={one.id}>
              {groupOf(one.values) ? <Tag letter={groupOf(one.values)!.letter} /> : <span />}
              <button type="button" className="linkish" onClick={() => onOpen(one.id)}>
                {one.name ?? one.code}
              </button>
              <span className="small mut">
                {one.tieKind ? `${one.tieKind} ×${one.count}` : `×${formatNumber(one.weight)}`}
              </span>
              <b className="r">
                {reading ? formatNumber(number(one.values[`attribute:${reading.attributeId}`])) : ''}
              </b>
            </li>
          ))}
        </ul>
      </div>
    </>
  );
}

function Against({
  props,
  detail,
  reading,
  name,
}: {
  props: ExploreProps;
  detail: MemberDetail;
  reading: ExploreReading;
  name: string;
}) {
  const key = `attribute:${reading.attributeId}`;
  const value = number(detail.member.values[key]);
  const departure = number(detail.member.values[`departure:${reading.id}`]);
  const smoothed = number(detail.member.values[`smoothed:${reading.id}`]);
  const around = detail.neighbours.flatMap((one) => {
    const score = number(one.values[key]);
    return score === null ? [] : [{ label: one.name ?? one.code ?? '', value: score }];
  });
  if (value === null)
    return (
      <div>
        <h3 className="h4">Against the neighbourhood</h3>
        <p className="small ink2">
          {reading.attribute} is not recorded. Neighbours suggest{' '}
          <span className="fi">≈ {formatNumber(smoothed)}</span>: a statement about the neighbourhood, not
          about {name}.
        </p>
      </div>
    );
  if (departure === null) return null;
  const predicted = value - departure;
  const scores = [value, predicted, ...around.map((one) => one.value)];
  const low = Math.min(...scores);
  const high = Math.max(...scores);
  const pad = (high - low) * 0.08 || 1;
  const q = number(detail.member.values[`q:${reading.id}`]);
  return (
    <div>
      <h3 className="h4" style={{ marginBottom: 6 }}>
        {reading.attribute} against the neighbourhood
      </h3>
      <StripPlot
        name={name}
        value={value}
        predicted={predicted}
        neighbours={around}
        domain={[low - pad, high + pad]}
      />
      <p className="small ink2" style={{ marginTop: 6 }}>
        Scores{' '}
        <b style={{ color: 'var(--c-madder)' }}>
          {formatDeparture(Math.abs(departure)).replace('+', '')} {departure < 0 ? 'below' : 'above'}
        </b>{' '}
        what {around.length} scored neighbours predict.{' '}
        {q === null ? (
          'Too few neighbours to test.'
        ) : (
          <>
            Chance of a false flag: <b>{formatChance(q)}</b>.
          </>
        )}
      </p>
      <a className="small" href={`${props.base}/readings/${reading.id}?snapshot=${props.snapshot.id}`}>
        The reading behind this
      </a>
    </div>
  );
}
