/**
 * Charts without domain knowledge. Laid out at real width; words never scale; every one has an accessible name.
 *
 * ChartFrame    label, height, children(width) → SVG content, table {head, rows}?  · TableFallback label, table
 * BottomAxis    x, y, ticks, from, to · LeftAxis y, ticks, from, to · ticksFor(domain, width, gap?, format?) · useWidth(fallback) → [ref, width]
 * TideStrip     label, bins, selection [lo,hi]|null, onChange, onStep?, height, format, missing, sub, summary, bare
 * binValues(values, count, domain) → {bins, missing} · colourBins(bins, 'diverging'|'sequential', {centre,spread}|{low,high}) · Bin {x0,x1,count,colour?,parts?}
 * StripPlot     name, value, colour, neighbours {label,value,colour}[], predicted, interval [lo,hi], everyone, domain, format, withTable
 * LineChart     label, points {label,value,predicted?,low?,high?}[], domain, height, format, withTable
 * Sparkline     values, label, pressing, width, height · MiniHistogram bins, label, height
 * Bar share, colour · BarCell share, text · DivergingBar value, most, width, height, colour · SplitBar left, right, colours
 * ColumnChart   label, columns {key,label,value,current?}[], height, format, withTable
 * Heatmap       label, rows {key,name,head}[], columns?, values, format, step, stitched [row,col][], diagonal · RampLegend kind, low, middle, high
 */
export { BottomAxis, LeftAxis, StripAxis } from './Axis';
export { binValues, colourBins, type Bin } from './bins';
export { ChartFrame, TableFallback, type ChartFrameProps, type ChartTable } from './ChartFrame';
export { ColumnChart, type Column, type ColumnChartProps } from './ColumnChart';
export { Heatmap, RampLegend, type HeatmapEntry, type HeatmapProps } from './Heatmap';
export { Bar, BarCell, DivergingBar, SplitBar, type DivergingBarProps } from './InlineBars';
export { LineChart, type LineChartProps, type LinePoint } from './LineChart';
export { MiniHistogram, Sparkline } from './Sparkline';
export { StripPlot, type StripPlotProps } from './StripPlot';
export { ticksFor, type Tick } from './ticks';
export { TideStrip, type TideStripProps } from './TideStrip';
export { useWidth } from './useWidth';
