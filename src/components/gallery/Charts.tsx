import { useState } from 'react';
import {
  BarCell,
  binValues,
  colourBins,
  ColumnChart,
  DivergingBar,
  Heatmap,
  LineChart,
  MiniHistogram,
  RampLegend,
  Sparkline,
  SplitBar,
  StripPlot,
  TideStrip,
} from '@/components/charts';
import { Card, Tag } from '@/components/ui';
import { divergingStep, rampColour } from '@/lib/ramps';

/** A fixed, smooth set of made-up scores between 1 and 5. */
const SCORES = Array.from(
  { length: 900 },
  (_, i) => 3.7 + 0.75 * Math.sin(i * 1.7) * Math.sin(i * 0.31) - (i % 40 === 0 ? 1.2 : 0),
);
const COLOURS = ['a', 'b', 'c'];
const AROUND = [3.57, 3.69, 3.75, 3.81, 3.88, 3.96, 4.05, 4.07, 4.09, 4.16, 4.17, 4.2, 4.21, 4.33, 4.34];
const GROUPS = ['A', 'B', 'C', 'D'].map((letter) => ({
  key: letter,
  name: `Group ${letter}`,
  head: <Tag letter={letter} />,
}));

/** All charts at work, for the gallery of the development server. */
export function Charts() {
  const [range, setRange] = useState<[number, number] | null>([2.4, 3.2]);
  const [stackedRange, setStackedRange] = useState<[number, number] | null>(null);
  const { bins } = binValues(SCORES, 80, [1, 5]);
  const tide = colourBins(bins, 'diverging', { centre: 3.6, spread: 1.2 });
  const stacked = bins.map((bin) => ({
    ...bin,
    parts: COLOURS.map((key, k) => ({
      key,
      colour: `var(--g-${key})`,
      count: k === 2 ? bin.count - 2 * Math.floor(bin.count / 3) : Math.floor(bin.count / 3),
    })),
  }));
  return (
    <div className="col g16">
      <Card title="Tide strip" level={2}>
        <TideStrip
          label="Helpfulness"
          sub="same ramp as the map"
          bins={tide}
          selection={range}
          onChange={setRange}
          summary={
            <>
              <b>212</b> of 900
            </>
          }
          missing={12}
        />
        <TideStrip
          label="Stacked"
          sub="by group"
          bins={stacked}
          selection={stackedRange}
          onChange={setStackedRange}
        />
        <TideStrip bare label="Bare" bins={tide} height={44} selection={range} onChange={setRange} />
      </Card>
      <Card
        title="Helpfulness against neighbours"
        aside={
          <>
            Chance of a false flag <b>under 1%</b>
          </>
        }
        level={2}
      >
        <StripPlot
          name="quiet-fern"
          value={2.58}
          predicted={4.08}
          interval={[3.65, 4.5]}
          domain={[1, 5]}
          colour={rampColour('diverging', 2)}
          everyone={SCORES.slice(0, 70)}
          withTable
          neighbours={AROUND.map((value, i) => ({
            label: `neighbour ${i + 1}`,
            value,
            colour: rampColour('diverging', divergingStep(value, 3.6, 1.2)),
          }))}
        />
      </Card>
      <div className="sg">
        <Card title="Over snapshots" level={2}>
          <LineChart
            label="Score over five snapshots, falling"
            points={[
              ['Jun 25', 4.02],
              ['Nov', 3.96],
              ['Feb 26', 3.71],
              ['Aug', null],
              ['Nov 26', 2.58],
            ].map(([label, value], i) => ({
              label: String(label),
              value: value as number | null,
              predicted: 4 + i * 0.02,
              low: 3.58,
              high: 4.5,
            }))}
          />
        </Card>
        <Card title="Ties between groups" level={2}>
          <Heatmap
            label="Ties between groups"
            rows={GROUPS}
            values={[
              [55, 1, 2.5, 0.4],
              [1, 48, 0.1, 0],
              [2.5, 0.1, 64, 2.1],
              [0.4, 0, 2.1, 68],
            ]}
            stitched={[
              [2, 3],
              [3, 2],
            ]}
          />
          <RampLegend kind="sequential" low="Few" high="Many" />
          <RampLegend kind="diverging" low="2.5 or less" middle="3.6" high="4.5 or more" />
        </Card>
        <Card title="How many groups?" level={2}>
          <ColumnChart
            label="Strength of each possible cut"
            columns={[2, 3, 4, 5, 6, 7, 8, 9, 10, 11, 12].map((k) => ({
              key: String(k),
              label: String(k),
              value: k === 8 ? 62 : 4 + ((k * 7) % 12),
              current: k === 8,
            }))}
          />
        </Card>
        <Card title="In rows" level={2}>
          <div className="col">
            <BarCell share={0.22} text="1.86" />
            <span className="row">
              <DivergingBar value={-1.75} most={2} />
              <b>−1.75</b>
              <DivergingBar value={0.6} most={2} />
              <b>+0.60</b>
            </span>
            <SplitBar left={5} right={4} colours={['var(--g-c)', 'var(--g-a)']} />
            <Sparkline values={[3.2, 3.3, 3.4, 3.35, 3.5, 3.6]} label="Six snapshots, rising" />
            <Sparkline values={[72, 71, null, 70, 68, 67]} pressing label="Six snapshots, falling" />
            <MiniHistogram bins={tide.filter((_, i) => i % 2 === 0)} label="Spread" />
          </div>
        </Card>
      </div>
    </div>
  );
}
