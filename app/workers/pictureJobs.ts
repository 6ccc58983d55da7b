import { patternDensity } from '../../engine/picture/patternDensity.ts';
import { cellCount, wholeWindow } from '../../engine/picture/window.ts';
import type { Job } from './jobs.ts';

export const density: Job<'density'> = ({ key, cells }, { shelf }) => {
  const { matrix } = shelf.get(key).loaded;
  const { rows, columns } = matrix;
  return patternDensity(
    matrix,
    null,
    null,
    wholeWindow(rows, columns),
    cellCount(rows, cells),
    cellCount(columns, cells),
  );
};
