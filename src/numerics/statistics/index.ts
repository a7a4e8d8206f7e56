export { energyCurve, type EnergyBand, type EnergyCurve } from './energy-curve';
export { benjaminiHochberg, median } from './false-discovery';
export { globalStatistics, type GlobalStatistic, type GlobalStatistics } from './global';
export { localMoran, QUADRANTS, type LocalMoran } from './local';
export { localPermutations, type LocalPermutations } from './local-permutations';
export { chiSquaredP, chiSquaredQuantile, incompleteGamma } from './gamma';
export { multiDeparture, type MultiDeparture } from './multi-departure';
export { erfc, twoSidedP } from './normal';
export { observedTies, rowStandardised, type ObservedTies } from './weights';
