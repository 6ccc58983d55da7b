import { describe, expect, it } from 'vitest';
import { choiceKey, letterOf } from '../../app/state/trial.ts';
import { parseUnknowns } from '../../app/trials/unknowns.ts';
import { defaultChoice } from '../../app/workers/rules.ts';

describe('stamps of trials', () => {
  it.each([
    [0, 'A'],
    [25, 'Z'],
    [26, 'AA'],
    [51, 'AZ'],
    [52, 'BA'],
    [702, 'AAA'],
  ])('the one after %d others is %s', (k, letter) => expect(letterOf(k)).toBe(letter));
});

describe('two trials are the same when all that matters is the same', () => {
  const lu = defaultChoice('lu', 'minimum-degree');
  it('sees another threshold', () => expect(choiceKey({ ...lu, threshold: 0.01 }, [])).not.toBe(choiceKey(lu, [])));
  it('looks away from a threshold that is not used', () => {
    const none = { ...lu, pivoting: 'none' as const };
    expect(choiceKey({ ...none, threshold: 0.01 }, [])).toBe(choiceKey(none, []));
  });
  it('sees the unknowns held last', () => expect(choiceKey(lu, [3])).not.toBe(choiceKey(lu, [])));
});

describe('unknowns as a person writes them', () => {
  it('takes numbers and ranges, counted from 1', () => {
    expect(parseUnknowns('7, 2-4 3', 10)).toEqual({ ok: true, list: [1, 2, 3, 6] });
  });
  it('takes nothing as none', () => expect(parseUnknowns('  ', 10)).toEqual({ ok: true, list: [] }));
  it.each(['0', '11', '4-2', 'a', '1.5', '1-10'])('refuses "%s" of 10 with a reason', (text) => {
    const read = parseUnknowns(text, 10);
    expect(read.ok).toBe(false);
  });
});
