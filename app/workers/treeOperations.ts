import type { FrontCourse } from '../../engine/picture/frontCourse.ts';
import type { TreePicture } from '../../engine/picture/treePicture.ts';
import type { TrialResult } from '../../engine/trial/result.ts';
import type { MatrixKey } from './protocol.ts';

/** The assembly tree of a trial and the course of a run over it, ready to be drawn. */
export interface TreeAnswer {
  readonly tree: TreePicture;
  readonly course: FrontCourse;
  /** unknowns */
  readonly size: number;
}

/** What the pictures of the tree ask of a worker. */
export interface TreeOperations {
  /** null for column LU, which has no fronts */
  tree: {
    ask: { key: MatrixKey; trial: string; result: TrialResult; heldLast: Int32Array };
    answer: TreeAnswer | null;
    early: never;
  };
  /** the original unknowns that a front eliminates, 0-based; null where the tree has to be laid first */
  front: { ask: { key: MatrixKey; trial: string; supernode: number }; answer: Int32Array | null; early: never };
}
