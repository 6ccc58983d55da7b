import { workOfFronts } from '../../engine/forecast/frontWork.ts';
import { frontCourse } from '../../engine/picture/frontCourse.ts';
import { treePicture } from '../../engine/picture/treePicture.ts';
import type { AssemblyTree } from '../../engine/symbolic/types.ts';
import { treeOf } from '../../engine/trial/forecast.ts';
import { arithmeticOf } from '../../engine/trial/run.ts';
import type { Job } from './jobs.ts';
import type { MatrixKey } from './protocol.ts';
import type { Shelf } from './shelf.ts';
import { contextOf } from './trialJobs.ts';

function slotOf(shelf: Shelf, key: MatrixKey, trial: string): { laid: AssemblyTree | null } {
  return shelf.derive<{ laid: AssemblyTree | null }>(key, `tree ${trial}`, () => ({ laid: null }));
}

export const tree: Job<'tree'> = ({ key, trial, result, heldLast }, { shelf }) => {
  const context = contextOf(shelf, key, heldLast);
  const { factorization } = result.choice;
  const laid = treeOf(context, result);
  if (laid === null || factorization === 'column-lu') return null;
  slotOf(shelf, key, trial).laid = laid;
  const lu = factorization === 'lu';
  const work = workOfFronts(factorization, laid, arithmeticOf(context, factorization));
  const layout = { blocks: lu ? 'square' : 'packed', parent: 'before' } as const;
  return { tree: treePicture(laid, work), course: frontCourse(laid, work, layout, lu), size: laid.size };
};

export const front: Job<'front'> = ({ key, trial, supernode }, { shelf }) => {
  const { laid } = slotOf(shelf, key, trial);
  return laid === null ? null : laid.order.slice(laid.firstColumn[supernode], laid.firstColumn[supernode + 1]);
};
