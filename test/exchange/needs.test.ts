/** The numbered bad and awkward inputs that concern reading: each with its fixture and the response it must get. */
import { describe, expect, it } from 'vitest';
import { codes, dense, faultOf, load, note } from './readSupport.ts';

const head = (field = 'real', symmetry = 'general') => `%%MatrixMarket matrix coordinate ${field} ${symmetry}\n`;
const two = '2 2 2\n1 1 1.5\n2 1 -2\n';
const twoDense = [
  [1.5, 0],
  [-2, 0],
];

describe('banner, comments, lines', () => {
  const accepted: [string, string, string[]][] = [
    [
      'needs 1: several blanks and tabs between banner words',
      `%%MatrixMarket \t matrix  coordinate\treal   general\n${two}`,
      [],
    ],
    [
      'needs 2: blanks before the banner, comments and size line',
      `  %%MatrixMarket matrix coordinate real general\n  % c\n  ${two}`,
      ['leading-blanks'],
    ],
    ['needs 3: mixed-case banner', `%%matrixmarket MATRIX Coordinate Real General\n${two}`, []],
    [
      'needs 4: a single % before the banner',
      `%MatrixMarket matrix coordinate real general\n${two}`,
      ['banner-repaired'],
    ],
    [
      'needs 5: extra text after the banner',
      `%%MatrixMarket matrix coordinate real general (from a run)\n${two}`,
      ['banner-extra'],
    ],
    [
      'needs 5: a bracket right behind a keyword',
      `%%MatrixMarket matrix coordinate real general[half]\n${two}`,
      ['banner-extra'],
    ],
    ['needs 6: CR LF', `${head()}${two}`.replaceAll('\n', '\r\n'), []],
    ['needs 6: lone CR', `${head()}${two}`.replaceAll('\n', '\r'), []],
    ['needs 6: byte-order mark', `\ufeff${head()}${two}`, []],
    [
      'needs 9: comments behind the size line and among entries',
      `${head()}2 2 2\n% a\n1 1 1.5\n% b\n2 1 -2\n`,
      ['comments-among-entries'],
    ],
    ['needs 10: blank lines anywhere', `${head()}\n\n2 2 2\n\n1 1 1.5\n  \n2 1 -2\n\n`, []],
    ['needs 36: unsorted entries', `${head()}2 2 2\n2 1 -2\n1 1 1.5\n`, []],
  ];
  for (const [title, text, notes] of accepted) {
    it(title, async () => {
      for (const chunk of [1 << 20, 1, 5]) {
        const loaded = await load(text, [], chunk);
        expect(dense(loaded.matrix)).toEqual(twoDense);
        for (const code of notes) expect(codes(loaded)).toContain(code);
        if (notes.length === 0) expect(codes(loaded)).toEqual([]);
      }
    });
  }
  it('needs 5: text glued to a keyword is refused', async () => {
    expect((await faultOf(`%%MatrixMarket matrix coordinate real generally\n${two}`)).message).toMatch(
      /line 1:.*symmetry/,
    );
  });
});

describe('missing banner or size', () => {
  it('needs 7: no banner: first line, columns, base and size are shown, and confirmed', async () => {
    const text = '0 0 1.5\n1 0 -2\n1 1 3\n';
    const fault = await faultOf(text);
    expect(fault.message).toMatch(/line 1:.*"0 0 1.5".*row, column, value, counted from 0/);
    expect(fault.repairs.map((r) => r.id)).toContain('read-as-coordinate-text');
    const loaded = await load(text, ['read-as-coordinate-text']);
    expect(dense(loaded.matrix)).toEqual([
      [1.5, 0],
      [-2, 3],
    ]);
    expect(note(loaded, 'coordinate-text')).toMatch(/counted from 0, 2 × 2/);
    // with a size line, and as one triangle
    const sized = await load('3 3 2\n1 1 4\n3 1 5\n', ['read-as-symmetric-text']);
    expect(dense(sized.matrix)).toEqual([
      [4, 0, 5],
      [0, 0, 0],
      [5, 0, 0],
    ]);
  });
  it('needs 8: banner but no size line', async () => {
    const text = `${head('real', 'symmetric')}1 1 1.5\n2 1 -2\n3 3 1\n`;
    const fault = await faultOf(text);
    expect(fault.message).toMatch(/line 2: expected the size line/);
    expect(fault.repairs.map((r) => r.id)).toEqual(['infer-size']);
    expect(dense((await load(text, ['infer-size'])).matrix)).toEqual([
      [1.5, -2, 0],
      [-2, 0, 0],
      [0, 0, 1],
    ]);
  });
  it('needs 8: a banner behind the entries is a comment and changes nothing', async () => {
    const loaded = await load(`2 1\n${head('complex')}`, ['read-as-coordinate-text']);
    expect([loaded.matrix.field, loaded.matrix.values]).toEqual(['pattern', null]);
  });
  it('needs 13: size line with 2 or 4 numbers or a word', async () => {
    for (const size of ['2 2', '2 2 2 2', '2 x 2', '2 2 -1', '2.5 2 2']) {
      expect((await faultOf(`${head()}${size}\n1 1 1\n`)).message).toMatch(
        `line 2: expected the size line with rows, columns and entries, found "${size}"`,
      );
    }
  });
  it('needs 14: absurd sizes are refused also where another reading was chosen', async () => {
    const array = '%%MatrixMarket matrix array real general\n2 316777217\n1\n2\n';
    expect((await faultOf(array, ['use-incomplete'])).message).toMatch(/byte 0: 2 × 316777217 with only 2 entries/);
    const text = '316777217 3 3\n1 1 1\n3 1 2\n3 3 4\n';
    expect((await faultOf(text, ['read-as-coordinate-text'])).code).toBe('size-absurd');
  });
  it('needs 14: absurd sizes are refused before anything is allocated', async () => {
    for (const size of [
      '18446744073709551615 1 1',
      '2147483648 2147483648 1',
      '3 3 99999999999',
      '2000000000 2000000000 2',
      '70000 70000 2000000000',
    ]) {
      expect((await faultOf(`${head()}${size}\n1 1 1\n`)).message).toMatch(/line 2/);
    }
    expect((await faultOf(`%%MatrixMarket matrix array real general\n100000 100000\n1\n`)).message).toMatch(
      /line 2.*10000000000 entries/,
    );
  });
});

describe('numbers of entries', () => {
  it('needs 11: fewer entries than declared', async () => {
    const text = `${head()}5 5 3\n1 1 1\n2 2 2.5`;
    const fault = await faultOf(`${text}${' '.repeat(9)}`);
    expect(fault.message).toMatch(/3 entries declared, 2 found; the file ends in line 4 \(last line cut\)/);
    expect((await faultOf(`${text}\n% more than enough bytes\n`)).message).toMatch(/last line complete/);
    expect(fault.repairs.map((r) => r.id)).toEqual(['use-incomplete']);
    const incomplete = await load(text, ['use-incomplete']);
    expect(note(incomplete, 'incomplete')).toMatch(/Incomplete: 3 entries declared, 2 found/);
    expect(incomplete.name).toBe('m.mtx (incomplete)');
    // from a size that the bytes cannot hold, before reading on
    expect((await faultOf(`${head()}5 5 50000\n1 1 1\n`)).code).toBe('declared-too-many');
  });
  it('needs 12: more entries than declared', async () => {
    const text = `${head()}2 2 1\n1 1 1\n2 2 4\n`;
    const fault = await faultOf(text);
    expect(fault.message).toMatch(/line 4: 1 entries are declared, and this is one more/);
    const loaded = await load(text, [fault.repairs[0].id]);
    expect(dense(loaded.matrix)).toEqual([
      [1, 0],
      [0, 4],
    ]);
    expect(note(loaded, 'surplus-used')).toMatch(/1 entries declared, 2 found/);
  });
});

describe('indices', () => {
  it('needs 15: 0-based indices', async () => {
    const text = `${head()}3 3 3\n0 0 1\n1 0 2\n2 2 3\n`;
    const fault = await faultOf(text);
    expect(fault.message).toMatch(/line 3: an index is 0, below 1 \(first of 2 such lines\).*0-based/);
    expect(dense((await load(text, [fault.repairs[0].id])).matrix)).toEqual([
      [1, 0, 0],
      [2, 0, 0],
      [0, 0, 3],
    ]);
    // an index equal to the size speaks against it: no offer
    expect((await faultOf(`${head()}3 3 2\n0 1 1\n3 3 2\n`)).repairs).toEqual([]);
  });
  it('needs 16: index too large, negative, or no integer', async () => {
    for (const i of ['4', '-1', '1e5', 'x', '99999999999999999999']) {
      expect((await faultOf(`${head()}3 3 1\n${i} 1 1.0\n`)).message).toMatch(/line 3: field 1, the row/);
    }
    const loaded = await load(`${head()}3 3 1\n1.0 2.00 7\n`);
    expect(dense(loaded.matrix)[0]).toEqual([0, 7, 0]);
    expect(codes(loaded)).toEqual(['index-as-decimal']);
  });
});

describe('fields and values', () => {
  it('needs 17: wrong number of fields; another kind is offered if all lines agree', async () => {
    const pattern = `${head('pattern')}2 2 2\n1 1 1.5\n2 2 2.5\n`;
    const fault = await faultOf(pattern);
    expect(fault.message).toMatch(/line 3: expected 2 fields .* found 3.*look like real values under a pattern banner/);
    expect(dense((await load(pattern, [fault.repairs[0].id])).matrix)).toEqual([
      [1.5, 0],
      [0, 2.5],
    ]);
    const mixed = await faultOf(`${head('pattern')}2 2 2\n1 1 1.5\n2 2\n`);
    expect([mixed.place.line, mixed.repairs]).toEqual([3, []]);
    expect((await faultOf(`${head()}2 2 2\n1 1 1.5\n2 2\n`)).message).toMatch(/line 4: expected 3 fields .* found 2/);
    const complex = await faultOf(`${head('complex')}2 2 1\n1 1 1.5\n`);
    expect(complex.repairs.map((r) => r.id)).toEqual(['read-as-real']);
  });
  it('needs 18: complex as (re,im) is accepted, re+imj refused with the expected form', async () => {
    const loaded = await load(`${head('complex')}1 1 1\n1 1 (1.5,-2)\n`);
    expect(Array.from(loaded.matrix.values ?? [])).toEqual([1.5, -2]);
    expect(codes(loaded)).toEqual(['complex-parentheses']);
    expect((await faultOf(`${head('complex')}1 1 1\n1 1 1.5-2j\n`)).message).toMatch(
      /line 3: .*two numbers, real and imaginary part/,
    );
  });
  it('needs 19: D exponents are accepted; the letterless form is refused in free text', async () => {
    expect(dense((await load(`${head()}1 1 1\n1 1 1.5D+02\n`)).matrix)).toEqual([[150]]);
    expect((await faultOf(`${head()}1 1 1\n1 1 1.0+300\n`)).message).toMatch(/line 3: field 3.*without its letter/);
  });
  it('needs 20: decimal comma and thousands separators', async () => {
    for (const v of ['1,5', '1,234.5', '1,234,567.5']) {
      expect((await faultOf(`${head()}1 1 1\n1 1 ${v}\n`)).message).toMatch(
        /line 3: field 3.*(decimal comma|Thousands)/,
      );
    }
  });
  it('needs 21: NaN and infinite values load for structure', async () => {
    const loaded = await load(`${head()}2 2 3\n1 1 nan\n2 1 -Inf\n2 2 1\n`);
    expect(loaded.notFinite).toBe(2);
    expect(note(loaded, 'not-finite')).toMatch(/2 values.*\(1, 1\), \(2, 1\).*numeric work is impossible/);
  });
  it('needs 22: overflow, underflow, denormals', async () => {
    const loaded = await load(`${head()}2 2 3\n1 1 1e9999\n2 1 1e-9999\n2 2 4e-324\n`);
    expect(dense(loaded.matrix)).toEqual([
      [Number.POSITIVE_INFINITY, 0],
      [0, 5e-324],
    ]);
    expect(loaded.matrix.rowIndex.length).toBe(3);
    expect(note(loaded, 'underflow')).toMatch(/^1 values/);
    expect(note(loaded, 'overflow')).toMatch(/^1 values/);
  });
  it('needs 23: integers above 2^53', async () => {
    const loaded = await load(`${head('integer')}2 2 2\n1 1 9007199254740993\n2 2 7\n`);
    expect(loaded.matrix.values?.[0]).toBe(9007199254740992);
    expect(codes(loaded)).toContain('large-integers');
    expect(note(loaded, 'large-integers')).toMatch(/^1 integers do not fit in 32 bits.*1 of them are 2\^53 or more/);
    const wide = await load(`${head('integer')}2 2 2\n1 1 4294967296\n2 2 -2147483648\n`);
    expect(note(wide, 'large-integers')).toBe('1 integers do not fit in 32 bits; all are held as doubles, exactly.');
    expect(codes(await load(`${head('integer')}1 1 1\n1 1 2147483647\n`))).toEqual([]);
  });
  it('needs 24: few digits', async () => {
    expect(note(await load(`${head()}2 2 2\n1 1 3.14159\n2 2 2.71828\n`), 'few-digits')).toMatch(
      /at most 6 digits.*1e-6/,
    );
    expect(codes(await load(`${head()}2 2 2\n1 1 3.14159265358979\n2 2 2.71828\n`))).toEqual([]);
  });
});

describe('symmetry', () => {
  it('needs 25: both triangles stored', async () => {
    const agree = await load(`${head('real', 'symmetric')}2 2 3\n1 1 1\n2 1 5\n1 2 5\n`);
    expect(dense(agree.matrix)).toEqual([
      [1, 5],
      [5, 0],
    ]);
    expect(codes(agree)).toEqual(['both-triangles']);
    expect((await faultOf(`${head('real', 'symmetric')}2 2 3\n1 1 1\n2 1 5\n1 2 6\n`)).message).toMatch(
      /line 5:.*\(2, 1\) and \(1, 2\)/,
    );
  });
  it('needs 25: triangles that contradict the banner: general, or the other complex symmetry if all pairs fit it', async () => {
    const differ = `${head('real', 'symmetric')}2 2 3\n1 1 1\n2 1 5\n1 2 6\n`;
    expect((await faultOf(differ)).repairs.map((r) => r.id)).toEqual(['read-as-general']);
    const general = await load(differ, ['read-as-general']);
    expect([dense(general.matrix), general.symmetry, note(general, 'read-otherwise')]).toEqual([
      [
        [1, 6],
        [5, 0],
      ],
      'general',
      'Read on request as: general instead of symmetric.',
    ]);
    const conjugates = `${head('complex', 'symmetric')}2 2 3\n1 1 1 0\n2 1 2 3\n1 2 2 -3\n`;
    expect((await faultOf(conjugates)).repairs.map((r) => r.id)).toEqual(['read-as-hermitian', 'read-as-general']);
    expect(Array.from((await load(conjugates, ['read-as-hermitian'])).matrix.values ?? [])).toEqual([
      1, 0, 2, 3, 2, -3,
    ]);
  });
  it('needs 26: upper triangle stored; Hermitian conjugated accordingly', async () => {
    const upper = await load(`${head('real', 'symmetric')}2 2 2\n1 1 1\n1 2 5\n`);
    expect([dense(upper.matrix), codes(upper)]).toEqual([
      [
        [1, 5],
        [5, 0],
      ],
      ['upper-triangle'],
    ]);
    const hermitian = await load(`${head('complex', 'hermitian')}2 2 1\n1 2 3 4\n`);
    // column 1 holds (2,1) = 3 − 4i, column 2 holds (1,2) = 3 + 4i
    expect(Array.from(hermitian.matrix.values ?? [])).toEqual([3, -4, 3, 4]);
  });
  it('needs 27: a symmetric kind that is not square', async () => {
    for (const s of ['symmetric', 'hermitian', 'skew-symmetric']) {
      expect((await faultOf(`${head('complex', s)}2 3 1\n1 1 1 0\n`)).message).toMatch(/line 2:.*2 × 3/);
    }
  });
  it('needs 28: skew-symmetric with diagonal entries', async () => {
    const zero = await load(`${head('real', 'skew-symmetric')}2 2 2\n1 1 0\n2 1 3\n`);
    expect(dense(zero.matrix)).toEqual([
      [0, -3],
      [3, 0],
    ]);
    expect([zero.matrix.rowIndex.length, zero.explicitZeros]).toEqual([3, 1]);
    expect((await faultOf(`${head('real', 'skew-symmetric')}2 2 2\n2 1 3\n1 1 4\n`)).message).toMatch(
      /line 4:.*diagonal entry 1 is 4/,
    );
  });
  it('needs 29: hermitian with real values is symmetric', async () => {
    const loaded = await load(`${head('real', 'hermitian')}2 2 1\n2 1 3\n`);
    expect([dense(loaded.matrix), codes(loaded), loaded.symmetry]).toEqual([
      [
        [0, 3],
        [3, 0],
      ],
      ['hermitian-real'],
      'symmetric',
    ]);
  });
  it('needs 30: Hermitian with a diagonal that is not real', async () => {
    const fault = await faultOf(`${head('complex', 'hermitian')}2 2 2\n1 1 1 0\n2 2 1 0.25\n`);
    expect(fault.message).toMatch(/line 4:.*\(2, 2\).*imaginary part 0.25/);
    expect(fault.repairs.map((r) => r.id)).toEqual(['read-as-symmetric']);
  });
  it('needs 31: complex symmetric that looks Hermitian, and the reverse', async () => {
    const text = `${head('complex', 'symmetric')}2 2 2\n1 1 1 0\n2 1 2 3\n`;
    const loaded = await load(text);
    expect(loaded.notes.find((n) => n.code === 'looks-hermitian')?.offers?.[0].id).toBe('read-as-hermitian');
    expect(Array.from(loaded.matrix.values ?? [])).toEqual([1, 0, 2, 3, 2, 3]);
    expect(Array.from((await load(text, ['read-as-hermitian'])).matrix.values ?? [])).toEqual([1, 0, 2, 3, 2, -3]);
  });
  it('needs 31: declared Hermitian, both triangles equal', async () => {
    const text = `${head('complex', 'hermitian')}2 2 3\n1 1 1 0\n2 1 2 3\n1 2 2 3\n`;
    expect((await faultOf(text)).repairs.map((r) => r.id)).toEqual(['read-as-symmetric', 'read-as-general']);
    expect(Array.from((await load(text, ['read-as-symmetric'])).matrix.values ?? [])).toEqual([1, 0, 2, 3, 2, 3]);
  });
  it('needs 32: complex with all imaginary parts zero', async () => {
    const text = `${head('complex')}1 1 1\n1 1 7 0\n`;
    expect((await load(text)).notes.find((n) => n.code === 'imaginary-zero')?.offers?.[0].id).toBe('use-as-real');
    const real = (await load(text, ['use-as-real'])).matrix;
    expect([real.field, Array.from(real.values ?? [])]).toEqual(['real', [7]]);
  });
  it('needs 33: symmetrising on request: the figure is told, the result is symmetric exactly; far from symmetric is refused', async () => {
    const near = `${head()}2 2 4\n1 1 4\n2 1 1\n1 2 1.0000000000000002\n2 2 4\n`;
    const loaded = await load(near, ['symmetrise']);
    expect(note(loaded, 'symmetrised')).toMatch(/differed by up to 2.220446049250313e-16 \(5.55e-17 of.*at \(2, 1\)/);
    const { values } = (await load(near, ['symmetrise'])).matrix;
    expect([values?.[1], values?.[0]]).toEqual([values?.[2], 4]);
    // an entry whose mirror is absent is halved into both places
    const lone = await load(`${head()}2 2 3\n1 1 4\n2 1 1e-18\n2 2 4\n`, ['symmetrise']);
    expect(dense(lone.matrix)).toEqual([
      [4, 5e-19],
      [5e-19, 4],
    ]);
    const hermitian = await load(`${head('complex')}2 2 4\n1 1 4 0\n2 1 1 2\n1 2 1 -2\n2 2 4 1e-17\n`, ['symmetrise']);
    expect(Array.from(hermitian.matrix.values ?? [])).toEqual([4, 0, 1, 2, 1, -2, 4, 0]);
    const far = await faultOf(`${head()}2 2 2\n1 1 4\n2 1 1\n`, ['symmetrise']);
    expect(far.message).toMatch(/line 4: mirror entries differ by up to 1, at \(2, 1\)/);
    await faultOf(`${head()}2 3 1\n1 1 4\n`, ['symmetrise']);
  });
  it('needs 33: a general file that is symmetric keeps its declaration; the survey measures it', async () => {
    const loaded = await load(`${head()}2 2 2\n1 2 5\n2 1 5\n`);
    expect([loaded.symmetry, dense(loaded.matrix)]).toEqual([
      'general',
      [
        [0, 5],
        [5, 0],
      ],
    ]);
  });
});

describe('entries', () => {
  it('needs 34: duplicates are summed, counted and listed; last-wins on request; a zero sum stays', async () => {
    const text = `${head()}2 2 4\n1 1 1\n1 1 -1\n2 2 3\n2 2 4\n`;
    const loaded = await load(text);
    expect([dense(loaded.matrix), loaded.duplicates, loaded.explicitZeros]).toEqual([
      [
        [0, 0],
        [0, 7],
      ],
      2,
      1,
    ]);
    expect(note(loaded, 'duplicates-summed')).toMatch(/^2 entries.*\(1, 1\), \(2, 2\)/);
    expect(dense((await load(text, ['keep-last-duplicate'])).matrix)).toEqual([
      [-1, 0],
      [0, 4],
    ]);
    const symmetric = await load(`${head('real', 'symmetric')}2 2 2\n2 1 1\n2 1 1\n`);
    expect([dense(symmetric.matrix), symmetric.duplicates]).toEqual([
      [
        [0, 2],
        [2, 0],
      ],
      1,
    ]);
  });
  it('needs 35: explicit zeros are kept and counted; dropping is a step of its own', async () => {
    const text = `${head()}2 2 3\n1 1 0\n2 1 1e-20\n2 2 3\n`;
    const loaded = await load(text);
    expect([loaded.matrix.rowIndex.length, loaded.explicitZeros]).toEqual([3, 1]);
    expect((await load(text, ['drop-zeros'])).matrix.rowIndex.length).toBe(2);
    const dropped = await load(text, ['drop-below=1e-12']);
    expect(dropped.matrix.rowIndex.length).toBe(1);
    expect(note(dropped, 'zeros-dropped')).toMatch(/^2 stored entries/);
  });
  it('needs 37: a pattern has no values', async () => {
    const loaded = await load(`${head('pattern')}2 2 1\n2 1\n`);
    expect([loaded.matrix.values, loaded.explicitZeros]).toEqual([null, null]);
    expect(loaded.notes.find((n) => n.code === 'pattern-only')?.offers?.map((o) => o.id)).toEqual(['synthetic-values']);
  });
  it('needs 37: synthetic values only on request, labelled in the name; diagonally dominant', async () => {
    const text = `${head('pattern', 'symmetric')}3 3 5\n1 1\n2 1\n2 2\n3 2\n3 3\n`;
    const loaded = await load(text, ['synthetic-values']);
    expect(dense(loaded.matrix)).toEqual([
      [2, -1, 0],
      [-1, 3, -1],
      [0, -1, 2],
    ]);
    expect([loaded.name, loaded.matrix.field]).toEqual(['m.mtx (synthetic values)', 'real']);
    expect(note(loaded, 'synthetic-values')).toMatch(/synthetic.*say nothing about the real system/);
    const own = await load(head() + two, ['synthetic-values']);
    expect([own.name, codes(own)]).toEqual(['m.mtx', ['values-kept']]);
  });
  it('needs 38: arrays column by column; rows of values are asked about', async () => {
    const array = (body: string, symmetry = 'general') => `%%MatrixMarket matrix array real ${symmetry}\n2 2\n${body}`;
    expect(dense((await load(array('1\n2\n3\n4\n'))).matrix)).toEqual([
      [1, 3],
      [2, 4],
    ]);
    expect(dense((await load(array('1\n2\n3\n', 'symmetric'))).matrix)).toEqual([
      [1, 2],
      [2, 3],
    ]);
    expect(dense((await load(array('2\n', 'skew-symmetric'))).matrix)).toEqual([
      [0, -2],
      [2, 0],
    ]);
    const fault = await faultOf(array('1 2\n3 4\n'));
    expect(fault.message).toMatch(/line 3:.*seems to hold a row/);
    expect(dense((await load(array('1 2\n3 4\n'), [fault.repairs[0].id])).matrix)).toEqual([
      [1, 2],
      [3, 4],
    ]);
  });
  it('needs 44: empty matrices and n = 1', async () => {
    expect((await load(`${head()}0 0 0\n`)).matrix.columns).toBe(0);
    expect((await load(`${head()}3 3 0\n`)).matrix.rowIndex.length).toBe(0);
    expect(dense((await load(`${head()}1 1 1\n1 1 2\n`)).matrix)).toEqual([[2]]);
    expect((await faultOf('')).message).toMatch(/byte 0: the file is empty/);
    expect((await faultOf('\n\n')).message).toMatch(/line/);
  });
  it('needs 46: rectangular', async () => {
    expect(dense((await load(`${head()}2 3 1\n2 3 4\n`)).matrix)).toEqual([
      [0, 0, 0],
      [0, 0, 4],
    ]);
  });
});
