/** Calibration on this machine: what it returns is usable; how fast the machine is, is not tested. */
import { describe, expect, it } from 'vitest';
import { defaultTarget } from '../../engine/forecast/target.ts';
import { Cancelled } from '../../engine/matrix/progress.ts';
import { calibrateHere } from '../../engine/trial/calibration.ts';

describe('calibration', () => {
  it('gives positive rates, large fronts no slower than small ones, and the error against its own runs', () => {
    const phases = new Set<string>();
    const { target, runs, modelError } = calibrateHere(defaultTarget, (_f, phase) => phases.add(phase), {
      leastRounds: 1,
      enoughSeconds: 0,
    });
    expect(target).toMatchObject({ memoryBytes: defaultTarget.memoryBytes, cores: defaultTarget.cores });
    expect(target.smallRate).toBeGreaterThan(0);
    expect(target.largeRate).toBeGreaterThanOrEqual(target.smallRate);
    expect(target.bandwidth).toBeGreaterThan(0);
    const worst = Math.max(...runs.map((r) => Math.max(r.modelled / r.seconds, r.seconds / r.modelled) - 1));
    expect(modelError).toBeCloseTo(worst, 9);
    expect(phases.size).toBe(runs.length);
  });
  it('can be cancelled', () => {
    const stop = (): never => {
      throw new Cancelled();
    };
    expect(() => calibrateHere(defaultTarget, stop)).toThrow(Cancelled);
  });
});
