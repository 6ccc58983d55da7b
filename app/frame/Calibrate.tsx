import { useRef, useState } from 'react';
import { asText, rate } from '../figures/format.ts';
import { setSettings, settingsStore } from '../state/settings.ts';
import { pool } from '../state/vault.ts';
import type { Task } from '../workers/pool.ts';
import type { Answer } from '../workers/protocol.ts';

/** Measures this browser and takes its rates as those of the target. */
export function Calibrate() {
  const [state, setState] = useState<{ fraction: number; found: Answer<'calibrate'> | null; failed: string | null }>({
    fraction: -1,
    found: null,
    failed: null,
  });
  const task = useRef<Task<Answer<'calibrate'>> | null>(null);
  const run = async () => {
    setState({ fraction: 0, found: null, failed: null });
    const running = pool.run(
      'calibrate',
      { target: settingsStore.getState().target },
      { lane: 'long', priority: 5, hear: ({ fraction }) => setState((s) => ({ ...s, fraction })) },
    );
    task.current = running;
    const reply = await running.reply;
    if (!reply.ok) {
      setState({ fraction: -1, found: null, failed: reply.failure.message });
      return;
    }
    const { largeRate, smallRate, bandwidth } = reply.value.target;
    setSettings({ target: { ...settingsStore.getState().target, largeRate, smallRate, bandwidth } });
    setState({ fraction: -1, found: reply.value, failed: null });
  };
  return (
    <div className="calibrate">
      {state.fraction < 0 ? (
        <button type="button" onClick={() => void run()}>
          Measure this browser
        </button>
      ) : (
        <>
          <progress value={state.fraction} max={1} aria-label="Measuring" />{' '}
          <button type="button" onClick={() => task.current?.stop()}>
            Stop
          </button>
        </>
      )}
      <p className="small soft" role="status">
        {state.failed ??
          (state.found === null
            ? 'A few seconds of model factorizations on one core; their rates then stand above.'
            : `Large fronts ${asText(rate(state.found.target.largeRate))}, small ones ${asText(rate(state.found.target.smallRate))}. The time model met its own ${state.found.runs.length} runs within a factor of ${(1 + state.found.modelError).toFixed(2)}.`)}
      </p>
    </div>
  );
}
