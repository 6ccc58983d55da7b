import { defaultTarget } from '../forecast/target.ts';
import { calibrateHere } from '../trial/calibration.ts';
import { jsonText, type Output, shortNumber, shortSeconds, tableText } from './output.ts';
import type { Call } from './parse.ts';

/** `calibrate`: rates of this machine for forecasts of time. */
export async function calibrateCommand(call: Call, out: Output): Promise<number> {
  const { target, runs, modelError } = calibrateHere(defaultTarget);
  const { largeRate, smallRate, bandwidth } = target;
  if (call.flag('json')) {
    out.line(jsonText({ largeRate, smallRate, bandwidth, modelError, runs }));
    return 0;
  }
  const rows = runs.map((r) => [
    r.problem,
    shortNumber(r.operations),
    shortSeconds(r.seconds),
    shortSeconds(r.modelled),
  ]);
  out.line(tableText([['problem', 'operations', 'measured', 'modelled'], ...rows]));
  out.line('');
  const options = [
    `--large-rate ${largeRate.toPrecision(3)}`,
    `--small-rate ${smallRate.toPrecision(3)}`,
    `--bandwidth ${bandwidth.toPrecision(3)}`,
  ];
  out.line(`This machine, one core, this engine: ${options.join(' ')}`);
  out.line(`The model of time is within a factor of ${(1 + modelError).toFixed(2)} of these runs.`);
  return 0;
}
