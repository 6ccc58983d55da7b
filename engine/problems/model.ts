import type { SparseMatrix } from '../matrix/pattern.ts';
import { elasticity3d } from './brick.ts';
import {
  convdiff2d,
  convdiff3d,
  denserow,
  grid2d5,
  grid2d9,
  grid3d7,
  grid3d27,
  helmholtz3d,
  hermitian2d,
} from './modelGrids.ts';
import { arrow, blocktri, circuit, kkt, powernet, tree } from './modelNetworks.ts';

/** Model problems by name; the argument is the size (points along an edge for grids, unknowns for networks). */
export const modelProblems: Readonly<Record<string, (size: number) => SparseMatrix>> = {
  grid2d5,
  grid2d9,
  grid3d7,
  grid3d27,
  elasticity3d,
  convdiff2d,
  convdiff3d,
  helmholtz3d,
  hermitian2d,
  denserow,
  circuit,
  powernet,
  kkt,
  arrow,
  tree,
  blocktri,
};
