/** The engine's words for measured against declared symmetry: a small pure function that the page may call on the spot. */
export { measuredSymmetry } from '../../engine/survey/declared.ts';
