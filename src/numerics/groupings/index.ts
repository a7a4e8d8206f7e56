export { agreement, type Agreement } from './agreement';
export { chooseCut, sweep, tieTolerance, type CutRule, type Sweep } from './cut';
export { fiedlerGrouping, type FiedlerGrouping, type FiedlerOptions } from './fiedler';
export { kMeans, type KMeans } from './kmeans';
export { eigengaps, spectralGrouping, type SpectralGrouping, type SpectralOptions } from './kway';
export { spectralLayout, type Layout } from './layout';
export { mergeSmall, renumber } from './merge';
export { refineByNeighbours } from './refine';
export {
  boundaryMembers,
  describeGroups,
  groupCount,
  modularity,
  type Between,
  type BoundaryMembers,
  type GroupQuality,
  type GroupingQuality,
} from './quality';
