/** Recognising and checking a recipe: a small text, read on the spot. */
export { looksLikeRecipe, parseRecipe } from '../../engine/handover/parseRecipe.ts';
