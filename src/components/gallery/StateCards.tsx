import {
  Banner,
  Button,
  Card,
  Checkbox,
  EmptyState,
  ErrorState,
  LoadingState,
  Pagination,
  ProgressBar,
  SkeletonTable,
  StatusBadge,
  Stepper,
  Tabs,
  Tag,
} from '@/components/ui';

/** Empty, loading and error, tables and messages, for the gallery of the development server. */
export function StateCards() {
  return (
    <div className="sg">
      <Card>
        <EmptyState
          picture="beam"
          title="The loom is set up. Add the first threads."
          level={2}
          actions={
            <>
              <Button kind="primary" size="small">
                Load a snapshot
              </Button>
              <Button kind="quiet" size="small">
                Try with sample data
              </Button>
            </>
          }
        >
          Load a file of ties and one of members. It takes about five minutes.
        </EmptyState>
      </Card>
      <Card>
        <EmptyState
          picture="settled"
          title="Nothing to review"
          level={2}
          actions={<Button size="small">See all cases</Button>}
        >
          No case is due before 4 December.
        </EmptyState>
      </Card>
      <Card>
        <LoadingState title="Reading helpfulness" level={2} progress={0.49} onStop={() => undefined}>
          620 of 1,264 threads. You can leave; we’ll keep it in Readings.
        </LoadingState>
      </Card>
      <Card>
        <ErrorState
          title="This reading needs one connected community."
          detail="61 members have no path to the rest."
          actions={
            <>
              <Button kind="primary" size="small">
                Leave 61 out
              </Button>
              <Button size="small">See who they are</Button>
            </>
          }
        >
          Leave them out, or read each part by itself. Nothing was changed.
        </ErrorState>
      </Card>
      <Card title="Table, first paint" level={2}>
        <SkeletonTable rows={4} />
      </Card>
      <Card title="Messages" level={2}>
        <div className="col">
          <Banner title="A departure is a reason to look, not a finding.">Read recent posts first.</Banner>
          <Banner tone="offline" title="You’re offline.">
            Showing the map from 14:02.
          </Banner>
          <Banner tone="info" icon="lock">
            Nothing is saved until you load.
          </Banner>
          <Banner tone="done">Loaded.</Banner>
          <ProgressBar label="Checking rows" value={0.66} look="weft" />
          <ProgressBar label="Waiting" value={null} />
        </div>
      </Card>
      <Card title="Members" aside="2 rows" flush level={2} className="wide">
        <div className="tscroll" tabIndex={0} role="region" aria-label="Members, table">
          <table className="tbl">
            <thead>
              <tr>
                <th>
                  <Checkbox label="All" hideLabel indeterminate checked={false} onChange={() => undefined} />
                </th>
                <th>Member</th>
                <th className="r">Score</th>
                <th className="r" aria-sort="ascending">
                  <button type="button" className="th-s">
                    Departure
                  </button>
                </th>
                <th className="r">Belonging</th>
                <th>Case</th>
              </tr>
            </thead>
            <tbody>
              <tr>
                <td>
                  <Checkbox label="wild-dibber" hideLabel defaultChecked={false} />
                </td>
                <td>
                  <span className="row">
                    <Tag letter="B" />
                    <span className="hd">wild-dibber</span>
                  </span>
                </td>
                <td className="r">1.86</td>
                <td className="r b">−1.75</td>
                <td className="r">
                  <span className="fi">≈ 69</span>
                </td>
                <td>
                  <StatusBadge tone="weld">Watching</StatusBadge>
                </td>
              </tr>
              <tr className="on">
                <td>
                  <Checkbox label="quiet-fern" hideLabel defaultChecked />
                </td>
                <td>
                  <span className="row">
                    <Tag letter="C" />
                    <span className="hd">quiet-fern</span>
                  </span>
                </td>
                <td className="r">2.58</td>
                <td className="r b">−1.50</td>
                <td className="r">
                  <b>81</b>
                </td>
                <td>
                  <StatusBadge tone="woad">Reach out</StatusBadge>
                </td>
              </tr>
            </tbody>
          </table>
        </div>
        <Pagination
          from={0}
          shown={2}
          total={312}
          onNext={() => undefined}
          pageSize={50}
          onPageSize={() => undefined}
        />
      </Card>
      <Card className="wide">
        <Stepper
          label="Steps of a load"
          current={1}
          steps={[
            { label: 'Files', href: '#' },
            { label: 'Match columns' },
            { label: 'Check rows' },
            { label: 'Load' },
          ]}
        />
        <Tabs
          label="Parts"
          tabs={[
            { id: 'a', label: 'Evidence', content: 'First' },
            { id: 'b', label: 'Trail', content: 'Second' },
          ]}
        />
      </Card>
    </div>
  );
}
