/** The cost of a workload and its break-evens: plain arithmetic on modelled seconds. */
export { type BreakEven, compareWorkload, type TrialCost, workloadSeconds } from '../../engine/forecast/workload.ts';
