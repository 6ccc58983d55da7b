import { type ParseArgsConfig, parseArgs } from 'node:util';
import { Fault } from '../matrix/fault.ts';

/** One option of a command. */
export interface OptionRule {
  /**
   * `flag` takes no value; `text` any; `word` one of `words`; `integer`/`number` within [low, high]; `bytes` a number with an optional unit
   * of 2¹⁰ (KiB, MiB, GiB, TiB) or 10³ (kB, MB, GB, TB); `list` words of `words`, comma-separated
   */
  readonly kind: 'flag' | 'text' | 'word' | 'integer' | 'number' | 'bytes' | 'list';
  readonly words?: readonly string[];
  readonly low?: number;
  readonly high?: number;
  /** may be given more than once (kind "text" only) */
  readonly many?: boolean;
  /** one line of help */
  readonly help: string;
  /** how the value is called in the help */
  readonly value?: string;
}

export interface CommandRule {
  readonly name: string;
  readonly help: string;
  /** how many files it takes, least and most */
  readonly files: readonly [number, number];
  readonly options: Readonly<Record<string, OptionRule>>;
  /** calls as they are typed after the program's name, each with what it does */
  readonly examples?: readonly (readonly [string, string])[];
}

/** A checked call. */
export interface Call {
  readonly command: CommandRule;
  readonly files: readonly string[];
  flag(name: string): boolean;
  text(name: string): string | null;
  texts(name: string): readonly string[];
  number(name: string): number | null;
  list(name: string): readonly string[] | null;
}

function usage(code: string, message: string): Fault {
  return new Fault('input', code, message);
}

/**
 * Checks `words` (without the program's own name) against the rules.
 * @throws Fault "usage" naming the word, what was expected, and how to see the help.
 */
export function parseCall(words: readonly string[], commands: readonly CommandRule[]): Call {
  const [name, ...rest] = words;
  const command = commands.find((c) => c.name === name);
  if (command === undefined) {
    const known = commands.map((c) => c.name).join(', ');
    throw usage(
      'unknown-command',
      name === undefined
        ? `No command given. Commands: ${known}. "help" explains them.`
        : `Unknown command "${name}". Commands: ${known}. "help" explains them.`,
    );
  }
  const options: NonNullable<ParseArgsConfig['options']> = {};
  for (const [key, rule] of Object.entries(command.options)) {
    options[key] = { type: rule.kind === 'flag' ? 'boolean' : 'string', multiple: rule.many ?? false };
  }
  let parsed: ReturnType<typeof parseArgs>;
  try {
    parsed = parseArgs({ args: rest, options, allowPositionals: true, strict: true });
  } catch (error) {
    const known = Object.keys(command.options).map((key) => `--${key}`);
    const said = error instanceof Error ? error.message.split('. ')[0] : String(error);
    throw usage('usage', `${said}. Options of "${command.name}": ${known.join(' ')}.`);
  }
  const files = parsed.positionals;
  const [least, most] = command.files;
  if (files.length < least || files.length > most) {
    const wanted =
      least === most ? `${least}` : most === Number.POSITIVE_INFINITY ? `at least ${least}` : `${least} to ${most}`;
    throw usage('file-count', `"${command.name}" takes ${wanted} file${most === 1 ? '' : 's'}, ${files.length} given.`);
  }
  const values = parsed.values as Record<string, string | boolean | string[] | undefined>;
  for (const [key, rule] of Object.entries(command.options)) {
    const given = values[key];
    if (typeof given === 'string') checkValue(key, rule, given);
  }
  const text = (key: string): string | null => {
    const given = values[key];
    return typeof given === 'string' ? given : null;
  };
  return {
    command,
    files,
    flag: (key) => values[key] === true,
    text,
    texts: (key) => {
      const given = values[key];
      return Array.isArray(given) ? given : typeof given === 'string' ? [given] : [];
    },
    number: (key) => {
      const given = text(key);
      return given === null ? null : command.options[key]?.kind === 'bytes' ? bytesOf(given) : Number(given);
    },
    list: (key) => {
      const given = text(key);
      return given === null ? null : given.split(',').map((word) => word.trim());
    },
  };
}

function checkValue(key: string, rule: OptionRule, given: string): void {
  if (rule.kind === 'word' && !rule.words?.includes(given)) {
    throw usage('unknown-word', `--${key} ${given}: expected one of ${rule.words?.join(', ')}.`);
  }
  if (rule.kind === 'list') {
    const words = given.split(',').map((word) => word.trim());
    const strange = rule.words === undefined ? undefined : words.find((word) => !rule.words?.includes(word));
    if (strange !== undefined) {
      throw usage(
        'unknown-word',
        `--${key}: "${strange}" is not known; expected words among ${rule.words?.join(', ')}.`,
      );
    }
  }
  if (rule.kind === 'bytes' && !(bytesOf(given) > 0)) {
    throw usage('bad-bytes', `--${key} ${given}: expected a number of bytes above 0, like 64GiB, 500MB or 1000000.`);
  }
  if (rule.kind === 'integer' || rule.kind === 'number') {
    const value = given.trim() === '' ? Number.NaN : Number(given);
    const low = rule.low ?? Number.NEGATIVE_INFINITY;
    const high = rule.high ?? Number.POSITIVE_INFINITY;
    if (!(value >= low && value <= high) || (rule.kind === 'integer' && !Number.isInteger(value))) {
      const what = rule.kind === 'integer' ? 'an integer' : 'a number';
      throw usage('bad-number', `--${key} ${given}: expected ${what}${rangeWords(low, high)}.`);
    }
  }
}

const byteUnits: Readonly<Record<string, number>> = {
  '': 1,
  b: 1,
  kib: 2 ** 10,
  mib: 2 ** 20,
  gib: 2 ** 30,
  tib: 2 ** 40,
  kb: 1e3,
  mb: 1e6,
  gb: 1e9,
  tb: 1e12,
};

/** "64GiB", "1.5 TB", "1000000"; NaN for anything else. */
function bytesOf(given: string): number {
  const found = /^\s*(\d+\.?\d*|\.\d+)(?:e(\d+))?\s*([a-z]*)\s*$/i.exec(given);
  const unit = found === null ? undefined : byteUnits[found[3].toLowerCase()];
  if (found === null || unit === undefined) return Number.NaN;
  return Math.floor(Number(found[1]) * 10 ** Number(found[2] ?? 0) * unit);
}

function rangeWords(low: number, high: number): string {
  if (Number.isFinite(low) && Number.isFinite(high)) return ` from ${low} to ${high}`;
  if (Number.isFinite(low)) return ` of at least ${low}`;
  if (Number.isFinite(high)) return ` of at most ${high}`;
  return '';
}

/** The help text of all commands, one line each; or of one command, with its options and examples. */
export function helpText(commands: readonly CommandRule[], name?: string): string {
  const lines: string[] = [];
  if (name === undefined) return overview(commands);
  for (const command of commands) {
    if (name !== undefined && command.name !== name) continue;
    const files = command.files[1] === 0 ? '' : command.files[1] === 1 ? ' FILE' : ' FILE …';
    lines.push(`${command.name}${files}`, `    ${command.help}`);
    for (const [key, rule] of Object.entries(command.options)) {
      const value =
        rule.kind === 'flag'
          ? ''
          : ` ${rule.value ?? (rule.kind === 'word' ? rule.words?.join('|') : rule.kind.toUpperCase())}`;
      lines.push(`    --${key}${value}`, `        ${rule.help}`);
    }
    if (name !== undefined && command.examples !== undefined) {
      lines.push('', '    Examples');
      for (const [call, what] of command.examples) lines.push(`      ${call}`, `        ${what}`);
    }
    lines.push('');
  }
  return lines.join('\n');
}

function overview(commands: readonly CommandRule[]): string {
  const widest = Math.max(...commands.map((c) => c.name.length));
  const lines = commands.map((c) => `  ${c.name.padEnd(widest)}  ${c.help}`);
  return [
    'Commands',
    ...lines,
    '',
    '"help COMMAND" or "COMMAND --help" lists the options of a command, with examples.',
    'Exit status: 0 done, 1 internal fault, 2 input or usage, 3 not completed, 4 completed but red, 5 a limit of a gate passed.',
    '',
  ].join('\n');
}
