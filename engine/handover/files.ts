import { writeMatrixMarket } from '../exchange/writeMatrixMarket.ts';
import { permutationExample, permutationFormula, writePermutation } from '../exchange/writePermutation.ts';
import { writeRutherfordBoeing } from '../exchange/writeRutherfordBoeing.ts';
import type { SparseMatrix } from '../matrix/pattern.ts';
import { type NewToOld, positionOf } from '../matrix/permutation.ts';
import { permute } from '../matrix/permute.ts';
import { noProgress, type Progress } from '../matrix/progress.ts';
import type { TrialContext } from '../trial/context.ts';
import type { TrialResult } from '../trial/result.ts';
import { comparisonCsv } from './csv.ts';
import { type HandedFactors, handedFactors, whyNoFactors } from './factors.ts';
import { textChunk } from './lines.ts';
import { recipeText } from './recipe.ts';
import { type ReportFacts, reportHtml } from './report.ts';
import { pythonScript } from './script.ts';
import { sheetJson, sheetText } from './sheetText.ts';
import { columnLines, frontLines, whyNoColumns, whyNoFronts } from './structure.ts';
import { type Convention, orderConvention, plannedRowOrder, scalingConvention, vectorChunks } from './vectors.ts';

/** Everything a handover is made from. */
export interface HandoverQuestion extends ReportFacts {
  /** the matrix with what came beside it */
  readonly context: TrialContext;
  readonly trial: TrialResult;
  /** set before every file name, so that files saved one by one tell what they are of; empty in a folder of their own */
  readonly prefix: string;
  /** bytes that taking out the factors may use, and the run that makes them */
  readonly factorLimit: number;
  readonly memoryLimit: number;
}

/** One file that leaves the program. */
export interface HandoverFile {
  /** stable word */
  readonly id: string;
  readonly name: string;
  readonly group: 'order' | 'rows and scalings' | 'matrix' | 'structure' | 'factors' | 'papers';
  /** one line */
  readonly what: string;
  readonly convention: Convention | null;
  readonly type: string;
  /** why it cannot be made, in a sentence; null where it can */
  readonly refused: string | null;
  /** its bytes; a numeric run for factors. @throws Fault as that run */
  chunks(progress?: Progress): Iterable<Uint8Array>;
}

type Group = HandoverFile['group'];

function file(
  id: string,
  name: string,
  group: Group,
  what: string,
  chunks: HandoverFile['chunks'],
  more: Partial<HandoverFile> = {},
): HandoverFile {
  return { id, name, group, what, convention: null, type: 'text/plain', refused: null, chunks, ...more };
}

/** All files of a handover, in the order in which they are shown. Bytes are made when asked for. */
export function handoverFiles(q: HandoverQuestion): readonly HandoverFile[] {
  const files = [
    ...paperFiles(q),
    ...orderFiles(q),
    ...rowFiles(q),
    ...matrixFiles(q),
    ...structureFiles(q),
    ...factorFiles(q),
  ];
  return files.map((f) => ({ ...f, name: q.prefix + f.name }));
}

function paperFiles(q: HandoverQuestion): HandoverFile[] {
  const { sheet, table, recipe } = q;
  const recipeChunks = () => (recipe === null ? [] : textChunk(recipeText(recipe)));
  return [
    file(
      'report',
      'report.html',
      'papers',
      'Report with pictures, definitions and cautions: one page by itself, to read, print and send',
      () => textChunk(reportHtml(q)),
      { type: 'text/html' },
    ),
    file(
      'sheet',
      'configuration-sheet.txt',
      'papers',
      'Configuration sheet: what to set in a solver, what to reserve, what to expect',
      () => textChunk(sheetText(sheet)),
    ),
    file(
      'sheet-json',
      'configuration-sheet.json',
      'papers',
      'The same as JSON, by the published schema configuration-sheet.schema.json',
      () => textChunk(sheetJson(sheet)),
      { type: 'application/json' },
    ),
    file(
      'comparison',
      'comparison.csv',
      'papers',
      `Comparison of ${table.rows.length} trials with exact figures and their kinds (RFC 4180)`,
      () => textChunk(comparisonCsv(table.rows, table.figures)),
      { type: 'text/csv' },
    ),
    file(
      'recipe',
      'recipe.json',
      'papers',
      'Recipe: inputs by size and hash, options, seeds and numbers; the page and the command line replay it',
      recipeChunks,
      {
        type: 'application/json',
      },
    ),
    scriptFile(q),
  ];
}

function scriptFile({ trial, context, name, prefix }: HandoverQuestion): HandoverFile {
  const { choice, counts, plan } = trial;
  const entries = choice.factorization === 'column-lu' ? counts.factorEntries : counts.lowerEntries;
  const chunks = () =>
    textChunk(
      pythonScript({
        matrixFile: `${prefix}matrix.mtx`,
        orderFile: `${prefix}order-0-based.txt`,
        rowOrderFile: plan.plannedRow === null ? null : `${prefix}row-order-0-based.txt`,
        blockStart: plan.blockStart,
        factorization: choice.factorization,
        ordering: `${trial.ran.ordering} of ${name.replace(/[^\x20-\x7e]/g, '?')}`,
        factorEntries: entries ?? 0,
        range: counts.range?.factorEntries ?? null,
      }),
    );
  const refused =
    entries === null || context.facts.rows !== context.facts.columns
      ? 'The counts of this trial are not defined.'
      : null;
  return file(
    'script',
    'check.py',
    'papers',
    'Script for NumPy and SciPy: loads matrix.mtx and the order, and reproduces the factor entries',
    chunks,
    {
      type: 'text/x-python',
      refused,
    },
  );
}

/** Plain text, 0-based, for scripts. */
function zeroBased(order: NewToOld, title: string): Iterable<Uint8Array> {
  return writePermutation(order, { direction: 'new-to-old', base: 0, format: 'plain', title });
}

function orderFiles({ trial, name }: HandoverQuestion): HandoverFile[] {
  const { effective, requested, ran } = trial;
  const title = (which: string) => `${name}, ${ran.ordering}, ${which} order`;
  const array = (order: NewToOld, direction: 'new-to-old' | 'old-to-new', which: string) => () =>
    writePermutation(order, { direction, base: 1, format: 'matrix-market-array', title: title(which) });
  const said = (order: NewToOld, direction: 'new-to-old' | 'old-to-new', base: 0 | 1): Partial<HandoverFile> => ({
    convention: {
      formula: permutationFormula(direction, base),
      example: permutationExample(direction === 'new-to-old' ? order : positionOf(order), direction, base),
    },
  });
  const files = [
    file(
      'order',
      'order.mtx',
      'order',
      'Permutation, new-to-old, 1-based, as a Matrix Market array',
      array(effective, 'new-to-old', 'effective'),
      said(effective, 'new-to-old', 1),
    ),
    file(
      'position',
      'position.mtx',
      'order',
      'Inverse permutation, old-to-new, 1-based, as a Matrix Market array',
      array(effective, 'old-to-new', 'effective'),
      said(effective, 'old-to-new', 1),
    ),
    file(
      'order-0',
      'order-0-based.txt',
      'order',
      'Permutation, new-to-old, 0-based, plain text: for scripts',
      () => zeroBased(effective, title('effective')),
      said(effective, 'new-to-old', 0),
    ),
  ];
  if (effective.some((i, k) => i !== requested[k])) {
    files.push(
      file(
        'requested',
        'requested-order.mtx',
        'order',
        'The order as the method gave it, before the postorder: same fill, its own bandwidth',
        array(requested, 'new-to-old', 'requested'),
        said(requested, 'new-to-old', 1),
      ),
    );
  }
  return files;
}

function rowFiles({ trial, name }: HandoverQuestion): HandoverFile[] {
  const { plan, choice, ran } = trial;
  const out: HandoverFile[] = [];
  const group = 'rows and scalings';
  if (choice.factorization === 'lu' || choice.factorization === 'column-lu') {
    const rows = plannedRowOrder(trial);
    const said = orderConvention(rows, 'row');
    const moved =
      plan.plannedRow === null ? 'the same as the columns' : 'rows moved so that planned pivots stand on the diagonal';
    const title = `${name}, ${ran.ordering}, planned row order`;
    out.push(
      file(
        'row-order',
        'row-order.mtx',
        group,
        `Row order of the LU before pivoting: ${moved}`,
        () => vectorChunks(rows, said, title),
        { convention: said },
      ),
    );
    if (plan.plannedRow !== null) {
      out.push(
        file(
          'row-order-0',
          'row-order-0-based.txt',
          group,
          'The same, 0-based, plain text: for scripts',
          () => zeroBased(rows, title),
          { convention: said },
        ),
      );
    }
  }
  for (const [side, scaling] of [
    ['row', plan.rowScaling],
    ['column', plan.columnScaling],
  ] as const) {
    if (scaling === null) continue;
    const said = scalingConvention(scaling, side);
    out.push(
      file(
        `${side}-scaling`,
        `${side}-scaling.mtx`,
        group,
        `Scaling of the ${side}s, in the original numbering`,
        () => vectorChunks(scaling, said, `${name}, ${choice.scaling}`),
        { convention: said },
      ),
    );
  }
  return out;
}

/** The matrix in the planned order: P·A·Q, values unscaled. */
export function permutedMatrix(context: TrialContext, trial: TrialResult): SparseMatrix {
  const { matrix } = context.input;
  const rows =
    matrix.rows === matrix.columns
      ? plannedRowOrder(trial)
      : (Int32Array.from({ length: matrix.rows }, (_, i) => i) as NewToOld);
  return permute(matrix, rows, trial.effective);
}

function matrixFiles({ context, trial, name }: HandoverQuestion): HandoverFile[] {
  const { matrix } = context.input;
  const symmetric = trial.plan.plannedRow === null && matrix.rows === matrix.columns;
  const formula = symmetric
    ? '(P A P^T)(k,l) = A(p[k], p[l]) with p = order, 1-based; values as they were read, not scaled'
    : matrix.rows === matrix.columns
      ? '(P A Q)(k,l) = A(p[k], q[l]) with p = row order, q = order, 1-based; values as they were read, not scaled'
      : '(A Q)(i,l) = A(i, q[l]) with q = order, 1-based; rows stay where they are';
  const example = Array.from(
    trial.effective.subarray(0, 5),
    (j, l) => `column ${l + 1} is the original column ${j + 1}`,
  );
  const convention = { formula, example };
  const comment = (text: string) => text.replace(/[^\x20-\x7e]/g, '?');
  return [
    file(
      'matrix',
      'matrix.mtx',
      'matrix',
      'The matrix as it was read: sorted, duplicates summed, all entries, Matrix Market',
      () =>
        writeMatrixMarket(matrix, { symmetry: 'general', storage: 'full', comments: [comment(`${name}, as read`)] }),
    ),
    file(
      'permuted',
      'permuted.mtx',
      'matrix',
      'The matrix in the new order, Matrix Market',
      () =>
        writeMatrixMarket(permutedMatrix(context, trial), {
          symmetry: 'general',
          storage: 'full',
          comments: [comment(`${name}, ${trial.ran.ordering}`), formula],
        }),
      { convention },
    ),
    file(
      'permuted-rb',
      'permuted.rb',
      'matrix',
      'The same in the Rutherford–Boeing format',
      () =>
        writeRutherfordBoeing(permutedMatrix(context, trial), {
          symmetry: 'general',
          title: comment(`${name}, ${trial.ran.ordering}`),
        }),
      { convention },
    ),
  ];
}

function structureFiles({ context, trial }: HandoverQuestion): HandoverFile[] {
  return [
    file(
      'columns',
      'columns.txt',
      'structure',
      'Entries of each column of L and its parent in the elimination tree',
      () => columnLines(trial),
      {
        refused: whyNoColumns(trial),
        convention:
          trial.parent === null || trial.columnCount === null
            ? null
            : {
                formula:
                  'one line a column in the effective order: position, original unknown, parent (0: a root), entries; all count from 1',
                example: Array.from(
                  trial.parent.subarray(0, 5),
                  (up, k) => `${k + 1} ${trial.effective[k] + 1} ${up + 1} ${trial.columnCount?.[k]}`,
                ),
              },
      },
    ),
    file(
      'fronts',
      'fronts.txt',
      'structure',
      'Assembly tree: order, pivots and parent of each front',
      () => frontLines(context, trial),
      {
        refused: whyNoFronts(trial),
      },
    ),
  ];
}

const factorWords = {
  lower: ['L.mtx', 'Factor L, Matrix Market, over positions'],
  diagonal: ['D.mtx', 'D of L·D·Lᵀ with its 2×2 blocks'],
  upper: ['U.mtx', 'Factor U, pivots on its diagonal'],
  offDiagonal: ['F.mtx', 'Entries above the diagonal blocks of the block triangular form, never factorized'],
} as const;

function factorFiles(q: HandoverQuestion): HandoverFile[] {
  const { context, trial, factorLimit, memoryLimit, name } = q;
  const refused = whyNoFactors(context, trial, factorLimit);
  // one numeric run for all of them
  let made: HandedFactors | null = null;
  const factors = (progress: Progress): HandedFactors => {
    made ??= handedFactors(context, trial, factorLimit, memoryLimit, progress);
    return made;
  };
  const { factorization, scaling } = trial.choice;
  const formula = {
    cholesky: '(P S A S P^T)(k,l) = (L L^H)(k,l)',
    ldlt: '(P S A S P^T)(k,l) = (L D L^T)(k,l), L^H where A is Hermitian; L with unit diagonal',
    lu: '(P R A C Q)(k,l) = (L U)(k,l), L with unit diagonal',
    'column-lu': '(P R A C Q)(k,l) = (L U + F)(k,l), L with unit diagonal',
  }[factorization];
  const said = {
    formula: `${formula}; row k is the original row p[k] of pivot-rows.mtx, column l the original column q[l] of pivot-columns.mtx${scaling === 'none' ? '; no scaling' : ''}`,
    example: [],
  };
  const kinds = (['lower', 'diagonal', 'upper', 'offDiagonal'] as const).filter(
    (kind) =>
      kind === 'lower' ||
      (kind === 'diagonal'
        ? factorization === 'ldlt'
        : kind === 'upper'
          ? factorization === 'lu' || factorization === 'column-lu'
          : (trial.plan.blockStart?.length ?? 0) > 2),
  );
  const files = kinds.map((kind) => {
    const [fileName, what] = factorWords[kind];
    return file(
      `factor-${kind}`,
      fileName,
      'factors',
      what,
      (progress = noProgress) => {
        const matrix = factors(progress)[kind];
        return matrix === null
          ? []
          : writeMatrixMarket(matrix, { symmetry: 'general', storage: 'full', comments: [said.formula] });
      },
      { refused, convention: said },
    );
  });
  for (const side of ['row', 'column'] as const) {
    files.push(
      file(
        `pivot-${side}s`,
        `pivot-${side}s.mtx`,
        'factors',
        `Original ${side} of each pivot, after all interchanges and delays`,
        (progress = noProgress) => {
          const { rowOrder, columnOrder } = factors(progress);
          const order = side === 'row' ? rowOrder : columnOrder;
          return vectorChunks(order, orderConvention(order, side), `${name}, pivots of ${factorization}`);
        },
        { refused },
      ),
    );
  }
  return files;
}
