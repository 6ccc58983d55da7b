/** The machine and the work that forecasts are reckoned for, as the engine defines them. */
export { defaultTarget, defaultWorkload, type Target, type Workload } from '../../engine/forecast/target.ts';
