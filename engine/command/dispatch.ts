import { Fault } from '../matrix/fault.ts';
import { calibrateCommand } from './calibrateCommand.ts';
import { commands } from './commands.ts';
import { compareCommand } from './compareCommand.ts';
import { factorCommand } from './factorCommand.ts';
import { gateCommand } from './gateCommand.ts';
import { growthCommand } from './growthCommand.ts';
import { handoverCommand } from './handoverCommand.ts';
import { combineCommand, convertCommand, differenceCommand } from './matrixCommands.ts';
import { orderCommand } from './orderCommand.ts';
import type { Output } from './output.ts';
import { type Call, helpText, parseCall } from './parse.ts';
import { reconcileCommand } from './reconcileCommand.ts';
import { replayCommand } from './replayCommand.ts';
import { surveyCommand } from './surveyCommand.ts';

const handlers: Readonly<Record<string, (call: Call, out: Output) => Promise<number>>> = {
  survey: surveyCommand,
  compare: compareCommand,
  order: orderCommand,
  factor: factorCommand,
  calibrate: calibrateCommand,
  growth: growthCommand,
  reconcile: reconcileCommand,
  handover: handoverCommand,
  replay: replayCommand,
  gate: gateCommand,
  convert: convertCommand,
  combine: combineCommand,
  difference: differenceCommand,
};

/** How a repair is said here: `--read WORD`, or an option of its own for files beside the matrix. */
function optionOf(id: string): string {
  return id.startsWith('permutation-') ? `--${id.replace('=', ' ')}` : `--read ${id}`;
}

/**
 * Runs one call of the command line.
 * @returns the exit status: 0 done, 1 internal fault, 2 input or usage, 3 not completed, 4 completed but red, 5 a gate's limit passed
 */
export async function dispatch(words: readonly string[], out: Output): Promise<number> {
  if (words[0] === 'help' || words.includes('--help')) {
    const name = [...words].filter((word) => word !== 'help' && word !== '--help')[0];
    if (name === undefined || commands.some((c) => c.name === name)) {
      out.line(helpText(commands, name));
      return 0;
    }
  }
  // nothing reaches standard output before the work is done, so that no partial result is taken for a whole one
  const lines: string[] = [];
  try {
    const call = parseCall(words[0] === 'help' ? words.slice(1) : words, commands);
    const status = await handlers[call.command.name](call, { ...out, line: (text) => lines.push(text) });
    for (const line of lines) out.line(line);
    return status;
  } catch (error) {
    if (error instanceof Fault) {
      out.error(error.message);
      for (const repair of error.repairs) out.error(`  ${optionOf(repair.id)}: ${repair.text}`);
      return error.kind === 'input' ? 2 : 3;
    }
    if (error instanceof RangeError && /allocation|array length|Array buffer/i.test(error.message)) {
      out.error(`Out of memory: ${error.message}. Choose an ordering with less fill, or a machine with more memory.`);
      return 3;
    }
    out.error(
      `Internal fault, please report it: ${error instanceof Error ? (error.stack ?? error.message) : String(error)}`,
    );
    return 1;
  }
}
