import { inUnit } from '../forecast/limits.ts';
import type { TableRow } from './csv.ts';
import { definitions } from './definitions.ts';
import type { Recipe } from './recipe.ts';
import { reportStyle } from './reportStyle.ts';
import type { ConfigurationSheet } from './sheet.ts';
import { secondsWords, sheetParts, whole } from './sheetText.ts';

/** A picture of the report, with the same facts in words. */
export interface ReportPicture {
  readonly title: string;
  readonly words: string;
  /** inline SVG markup made by this program, or a data URL of an image */
  readonly content: { readonly svg: string } | { readonly dataUrl: string };
}

/** What a report tells. */
export interface ReportFacts {
  readonly name: string;
  /** name of the trial that is handed over, as in the table */
  readonly trialName: string;
  readonly sheet: ConfigurationSheet;
  readonly table: { readonly rows: readonly TableRow[]; readonly figures: readonly string[] };
  readonly recipe: Recipe | null;
  readonly advice: readonly string[];
  readonly survey: readonly (readonly [string, string])[];
  readonly pictures: readonly ReportPicture[];
}

/** Text as HTML. */
export function escapeHtml(text: string): string {
  return text
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replaceAll('"', '&quot;')
    .replaceAll("'", '&#39;');
}

const esc = escapeHtml;

interface ReportColumn {
  readonly figure: string;
  readonly head: string;
  readonly write: (x: number) => string;
}

const short = (x: number): string =>
  Number.isInteger(x) && x < 1e6 ? whole(x) : x.toExponential(2).replace('e+', 'e');

const columns: readonly ReportColumn[] = [
  { figure: 'factorEntries', head: 'factor entries', write: short },
  { figure: 'operations', head: 'operations', write: short },
  { figure: 'factorBytes', head: 'factors', write: inUnit },
  { figure: 'peakBytes', head: 'peak memory', write: inUnit },
  { figure: 'largestFront', head: 'largest front', write: short },
  { figure: 'factorSeconds', head: 'factorization', write: secondsWords },
  { figure: 'totalSeconds', head: 'whole workload', write: secondsWords },
];

/**
 * The report as one HTML page that needs nothing else: styles, pictures and drawings are inside, and its own policy forbids every request.
 */
export function reportHtml(facts: ReportFacts): string {
  const { sheet, trialName } = facts;
  const title = `Factorization report: ${facts.name}`;
  const parts = [
    head(title),
    `<header><h1>${esc(facts.name)}</h1><p class="lead">${esc(leadOf(facts))}</p></header>`,
    cautionList(sheet.cautions),
    facts.advice.length === 0 ? '' : section('Advice', adviceOf(facts.advice)),
    facts.survey.length === 0 ? '' : section('Survey', definitionTable(facts.survey)),
    facts.pictures.length === 0 ? '' : section('Pictures', pictureFigures(facts)),
    section('Trials', tableOf(facts) + barsOf(facts)),
    section(
      `Configuration for trial ${trialName}`,
      sheetParts(sheet)
        .filter(({ title: t }) => t !== 'Matrix')
        .map(({ title: t, lines }) => `<h3>${esc(t)}</h3>${definitionTable(lines)}`)
        .join(''),
    ),
    section('Definitions and conventions', definitionTable(definitions)),
    section('Reproduce', reproduction(facts)),
    `<footer><p>Fillcast ${esc(sheet.version)}. Made on the machine of its author; nothing was sent.</p></footer></main></body></html>\n`,
  ];
  return parts.join('\n');
}

function head(title: string): string {
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8">
<meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src 'unsafe-inline'; img-src data:">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>${esc(title)}</title>
<style>${reportStyle}</style></head><body><main>`;
}

function leadOf({ sheet, trialName }: ReportFacts): string {
  const { matrix, fill, memory, time } = sheet;
  const size = `${whole(matrix.rows)} × ${whole(matrix.columns)}, ${whole(matrix.entries)} entries, ${matrix.field}, ${matrix.symmetry}.`;
  const need =
    memory === null
      ? ''
      : ` It fills ${whole(fill.factorEntries)} factor entries and asks for ${inUnit(memory.reserveBytes)} with its margin${time === null ? '' : `, ${secondsWords(time.factorizationSeconds)} a factorization (modelled)`}.`;
  return `${size} Handed over: trial ${trialName}, ${sheet.ordering.method}, ${sheet.factorization.kind}.${need}`;
}

function section(title: string, inner: string): string {
  return `<section><h2>${esc(title)}</h2>${inner}</section>`;
}

function cautionList(cautions: readonly string[]): string {
  return `<section class="cautions" aria-label="Cautions"><h2>Cautions</h2><ul>${cautions.map((c) => `<li>${esc(c)}</li>`).join('')}</ul></section>`;
}

/** The first sentence by itself, the others as its reasons, each once. */
function adviceOf(advice: readonly string[]): string {
  const [first, ...others] = new Set(advice);
  const reasons = others.map((line) => `<li>${esc(line)}</li>`).join('');
  return `<p>${esc(first)}</p>${reasons === '' ? '' : `<ul>${reasons}</ul>`}`;
}

function definitionTable(lines: readonly (readonly [string, string])[]): string {
  const rows = lines.map(([what, value]) => `<tr><th scope="row">${esc(what)}</th><td>${esc(value)}</td></tr>`);
  return `<table class="facts"><tbody>${rows.join('')}</tbody></table>`;
}

function pictureFigures({ pictures }: ReportFacts): string {
  const figures = pictures.map(({ title, words, content }) => {
    const drawn =
      'svg' in content
        ? content.svg
        : `<img alt="${esc(words)}" src="${/^data:image\/(png|jpeg|svg\+xml)[;,]/.test(content.dataUrl) ? esc(content.dataUrl) : ''}">`;
    return `<figure>${drawn}<figcaption><strong>${esc(title)}</strong> ${esc(words)}</figcaption></figure>`;
  });
  const legend =
    '<p class="legend"><span class="square"></span> entry of the matrix <span class="square open"></span> fill-in (in dots: hatched)</p>';
  return `<div class="pictures">${figures.join('')}</div>${legend}`;
}

function shownColumns({ table }: ReportFacts): readonly ReportColumn[] {
  return columns.filter(({ figure }) => table.rows.some((r) => (r.figures[figure]?.value ?? null) !== null));
}

function tableOf(facts: ReportFacts): string {
  const shown = shownColumns(facts);
  const best = new Map(
    shown.map(({ figure }) => [figure, Math.min(...facts.table.rows.flatMap((r) => r.figures[figure]?.value ?? []))]),
  );
  const headRow = ['trial', 'what it is', ...shown.map((c) => c.head)];
  const rows = facts.table.rows.map(({ name, choice, figures }) => {
    const cells = shown.map(({ figure, write }) => {
      const f = figures[figure];
      if (f === undefined || f.value === null) return '<td class="number">–</td>';
      const mark =
        f.value === best.get(figure) && facts.table.rows.length > 1 ? '<span class="best" title="best">▸</span> ' : '';
      return `<td class="number" title="${esc(String(f.value))}">${mark}${esc(write(f.value))}<br><small>${esc(f.kind)}</small></td>`;
    });
    const pivoting =
      choice.pivoting === 'threshold'
        ? `, threshold ${choice.threshold}`
        : choice.pivoting === 'static'
          ? ', static pivots'
          : '';
    const chosen = name === facts.trialName ? ' class="chosen"' : '';
    return `<tr${chosen}><th scope="row">${esc(name)}</th><td>${choice.ordering}<br><small>${choice.factorization}${pivoting}</small></td>${cells.join('')}</tr>`;
  });
  return `<div class="wide" tabindex="0" role="region" aria-label="Trials"><table class="trials"><thead><tr>${headRow.map((h) => `<th scope="col">${esc(h)}</th>`).join('')}</tr></thead><tbody>${rows.join('')}</tbody></table></div><p class="small">▸ best of its column. exact: from the pattern alone; bound: proven limit; modelled: from the rates of the target; measured: by a run.</p>`;
}

/** Bars of entries, operations and peak, drawn as SVG with the memory limit as a dashed line. */
function barsOf(facts: ReportFacts): string {
  const { rows } = facts.table;
  if (rows.length < 2) return '';
  const drawn = shownColumns(facts)
    .filter(({ figure }) => ['factorEntries', 'operations', 'peakBytes'].includes(figure))
    .map((column) => barChart(facts, column));
  return `<div class="charts">${drawn.join('')}</div>`;
}

function barChart({ table, sheet, trialName }: ReportFacts, { figure, head: title, write }: ReportColumn): string {
  const values = table.rows.map(({ name, figures }) => ({ name, value: figures[figure]?.value ?? null }));
  const most = Math.max(...values.map((v) => v.value ?? 0), 1);
  const limit = figure === 'peakBytes' && sheet.target.memoryBytes <= 1.5 * most ? sheet.target.memoryBytes : null;
  const full = Math.max(most, limit ?? 0);
  const width = 230;
  const left = 140;
  const bars = values.map(({ name, value }, k) => {
    const y = 8 + 20 * k;
    const long = ((value ?? 0) / full) * width;
    const weight = name === trialName ? ' font-weight="bold"' : '';
    return `<text x="${left - 6}" y="${y + 11}" text-anchor="end"${weight}>${esc(name.length > 22 ? `${name.slice(0, 21)}…` : name)}</text><rect x="${left}" y="${y}" width="${long.toFixed(1)}" height="14"/><text x="${(left + long + 5).toFixed(1)}" y="${y + 11}">${value === null ? '–' : esc(write(value))}</text>`;
  });
  const height = 14 + 20 * values.length;
  const line =
    limit === null
      ? ''
      : `<line x1="${left + (limit / full) * width}" x2="${left + (limit / full) * width}" y1="2" y2="${height - 2}" stroke-dasharray="4 3"/><text x="${left + (limit / full) * width + 4}" y="${height - 1}">limit ${esc(write(limit))}</text>`;
  const words = values.map(({ name, value }) => `${name} ${value === null ? 'not defined' : write(value)}`).join(', ');
  return `<figure><svg role="img" aria-label="${esc(`${title}: ${words}`)}" viewBox="0 0 470 ${height + 6}">${bars.join('')}${line}</svg><figcaption>${esc(title)}</figcaption></figure>`;
}

function reproduction({ recipe, name }: ReportFacts): string {
  if (recipe === null) return '<p>No recipe belongs to this report.</p>';
  const { file, contentSha256 } = recipe.matrix;
  const lines: [string, string][] = [
    ['matrix', file === null ? `${name}, made by this program` : `${file.name}, ${whole(file.bytes)} bytes`],
    ...(file === null ? [] : ([['SHA-256 of the file', file.sha256]] as [string, string][])),
    ['SHA-256 of its content', contentSha256],
    ['trials', recipe.trials.map((t) => `${t.name}: ${t.ran.ordering}, seed ${t.ran.seed}`).join('; ')],
    ['how', `replay ${file?.name ?? 'FILE'} --recipe recipe.json, or drop both files on the page`],
  ];
  return definitionTable(lines);
}
