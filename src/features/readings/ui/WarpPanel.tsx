import { scaleLinear, scaleSqrt } from 'd3-scale';
import { ChartFrame } from '@/components/charts';
import { formatNumber, formatPercent } from '@/lib/format';
import type { Warp } from '../readings';

const HEIGHT = 300;
const BEAM = 26;
const FOOT = 26;

/**
 * Energy of the scores by graph frequency, hung from a beam: the solid part of a thread is what the smoothed score
 * keeps, the dotted part is set aside. Lengths are by square root, so that short threads can be seen.
 */
export function WarpPanel({ warp }: { warp: Warp }) {
  const seen = warp.bands.reduce((sum, band) => sum + band.energy, 0);
  const kept = warp.bands.reduce((sum, band) => sum + Math.min(band.kept, band.energy), 0);
  const most = Math.max(1e-12, ...warp.bands.map((band) => Math.max(band.energy, band.kept)));
  const length = scaleSqrt()
    .domain([0, most])
    .range([0, HEIGHT - BEAM - FOOT - 8]);
  const all = warp.frequencies === warp.members;
  const words = all
    ? `The smoothed score keeps ${formatPercent(kept)} of the differences.`
    : `The ${warp.frequencies} smoothest patterns carry ${formatPercent(seen)} of the differences; the smoothed score keeps ${formatPercent(kept)} of all in them.`;
  return (
    <section className="card warp" aria-labelledby="warp-title">
      <h2 className="h3" id="warp-title">
        The warp
      </h2>
      <p className="small mut">
        Each thread is one graph frequency. The longer it hangs, the more of the difference it carries.
      </p>
      <ChartFrame
        label={`The warp: ${words}`}
        height={HEIGHT}
        table={{
          head: ['Graph frequency', 'Share of the differences', 'Kept by the smoothed score'],
          rows: warp.bands.map((band) => [
            formatNumber(band.from, 4),
            formatPercent(band.energy, 1),
            formatPercent(band.kept, 1),
          ]),
        }}
      >
        {(width) => {
          const x = scaleLinear()
            .domain([0, Math.max(1, warp.bands.length - 1)])
            .range([14, width - 14]);
          const thick = Math.max(1.5, Math.min(6, ((width - 28) / warp.bands.length) * 0.42));
          return (
            <>
              {warp.bands.map((band, index) => {
                const solid = length(Math.min(band.kept, band.energy));
                const whole = length(Math.max(band.energy, band.kept));
                return (
                  <g key={index}>
                    <title>{`Frequency ${formatNumber(band.from, 3)}: ${formatPercent(band.energy, 1)} of the differences, ${formatPercent(band.kept, 1)} kept`}</title>
                    {whole > solid + 1 && (
                      <path
                        d={`M${x(index)} ${BEAM + solid}V${BEAM + whole}`}
                        stroke="var(--c-ink-3)"
                        strokeWidth={thick}
                        strokeDasharray="2 3"
                      />
                    )}
                    <path
                      d={`M${x(index)} ${BEAM}V${BEAM + solid}`}
                      stroke="var(--c-ink)"
                      strokeWidth={thick}
                    />
                  </g>
                );
              })}
              <path
                d={`M4 ${BEAM - 2}H${width - 4}`}
                stroke="var(--c-ink)"
                strokeWidth={5}
                strokeLinecap="round"
              />
              <text x={12} y={HEIGHT - 6} style={{ fontWeight: 700 }}>
                Shared by all
              </text>
              <text x={width - 12} y={HEIGHT - 6} textAnchor="end" style={{ fontWeight: 700 }}>
                {all ? 'One-off' : 'Less shared'}
              </text>
            </>
          );
        }}
      </ChartFrame>
      <p className="small ink2">
        {words} Solid is kept, dotted is set aside as one-off; lengths by square root.
      </p>
    </section>
  );
}
