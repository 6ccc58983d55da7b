/** Tables as comma-separated values, as the engine writes them. */
export { comparisonCsv } from '../../engine/handover/csv.ts';
