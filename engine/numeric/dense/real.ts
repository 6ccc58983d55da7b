import type { DenseKernels } from './kernels.ts';
import { choleskyReal } from './realCholesky.ts';
import {
  applyReal,
  applyTransposedReal,
  combineReal,
  divideReal,
  invertPairReal,
  largestReal,
  modulusReal,
  pairedCoefficientsReal,
  scaleGroupsReal,
} from './realColumn.ts';
import { packReal, packTransposedReal, realGroup, updateReal } from './realUpdate.ts';

/** The primitives of dense fronts for real scalars. */
export const realKernels: DenseKernels = {
  width: 1,
  group: realGroup,
  pack: packReal,
  packTransposed: packTransposedReal,
  update: updateReal,
  cholesky: choleskyReal,
  modulus: modulusReal,
  largest: largestReal,
  apply: applyReal,
  applyTransposed: applyTransposedReal,
  divide: divideReal,
  combine: combineReal,
  invertPair: invertPairReal,
  pairedCoefficients: pairedCoefficientsReal,
  scaleGroups: scaleGroupsReal,
};
