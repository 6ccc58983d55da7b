import { choleskyComplex } from './complexCholesky.ts';
import {
  applyComplex,
  applyTransposedComplex,
  combineComplex,
  divideComplex,
  invertPairComplex,
  largestComplex,
  modulusComplex,
  pairedCoefficientsComplex,
  scaleGroupsComplex,
} from './complexColumn.ts';
import { complexGroup, packComplex, packTransposedComplex, updateComplex } from './complexUpdate.ts';
import type { DenseKernels } from './kernels.ts';

/** The primitives of dense fronts for complex scalars. */
export const complexKernels: DenseKernels = {
  width: 2,
  group: complexGroup,
  pack: packComplex,
  packTransposed: packTransposedComplex,
  update: updateComplex,
  cholesky: choleskyComplex,
  modulus: modulusComplex,
  largest: largestComplex,
  apply: applyComplex,
  applyTransposed: applyTransposedComplex,
  divide: divideComplex,
  combine: combineComplex,
  invertPair: invertPairComplex,
  pairedCoefficients: pairedCoefficientsComplex,
  scaleGroups: scaleGroupsComplex,
};
