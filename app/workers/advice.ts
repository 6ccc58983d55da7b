/** Advice over finished trials: plain sentences from plain figures. */
export { type AdvisedTrial, adviceFor } from '../../engine/trial/advice.ts';
