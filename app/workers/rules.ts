/** The engine's rules on what suits a matrix: small pure functions that the page may call on the spot. */
export {
  advisedFactorization,
  defaultChoice,
  type MatrixFacts,
  suitableOrderings,
  whyNoForecast,
  whyNoProof,
} from '../../engine/trial/rules.ts';
