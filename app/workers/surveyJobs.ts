import type { Fact } from '../../engine/survey/fact.ts';
import { type FactName, type Survey, survey as surveyOf } from '../../engine/survey/survey.ts';
import type { Job } from './jobs.ts';

/** A fact with its name, as it crosses ahead of the others. */
export interface NamedFact {
  readonly name: FactName;
  readonly fact: Fact<unknown>;
}

/** All facts of a matrix; each is told as soon as it is known. */
export const survey: Job<'survey'> = ({ key }, { shelf, progress, early }): Survey => {
  let fraction = 0;
  let phase = 'surveying';
  const watch = (f: number, p: string) => {
    fraction = f;
    phase = p;
    progress(f, p);
  };
  return surveyOf(shelf.get(key).loaded.matrix, watch, (name, fact) => early({ name, fact }, fraction, phase));
};
