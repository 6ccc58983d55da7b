import type { Graph } from './graph.ts';
import { type LevelStructure, levelsInto, type Part } from './levels.ts';

/**
 * A pseudo-peripheral vertex of the component of `start` (inside `part` where one is given): George & Liu 1979. From a root, take
 * a vertex of smallest degree in the last level; while its level structure is deeper, it becomes the root.
 * Ties: the smallest number. On return `work` holds the level structure rooted at the vertex returned.
 * Each round is linear in the edges of the component; the depth grows every round (a handful of rounds in practice).
 */
export function pseudoPeripheral(graph: Graph, start: number, work: LevelStructure, part: Part | null = null): number {
  levelsInto(work, graph, start, part);
  let root = start;
  let depth = work.levels;
  while (depth > 1) {
    root = smallestDegreeOfLastLevel(graph, work, part);
    levelsInto(work, graph, root, part);
    if (work.levels <= depth) break;
    depth = work.levels;
  }
  return root;
}

function smallestDegreeOfLastLevel(graph: Graph, work: LevelStructure, part: Part | null): number {
  let best = -1;
  let bestDegree = 0;
  for (let q = work.levelStart[work.levels - 1]; q < work.reached; q++) {
    const v = work.queue[q];
    const degree = degreeInside(graph, v, part);
    if (best < 0 || degree < bestDegree || (degree === bestDegree && v < best)) {
      best = v;
      bestDegree = degree;
    }
  }
  return best;
}

function degreeInside(graph: Graph, v: number, part: Part | null): number {
  const start = graph.pointer[v];
  const end = graph.pointer[v + 1];
  if (part === null) return end - start;
  let degree = 0;
  for (let p = start; p < end; p++) if (part.label[graph.neighbour[p]] === part.value) degree++;
  return degree;
}
