import { type RefObject, useEffect, useState } from 'react';
import { useStore } from 'zustand';
import { offlineStore } from '../offline/register.ts';
import { eraseSettings, setSettings, settingsStore, type Theme } from '../state/settings.ts';
import { canShare } from '../workers/shared.ts';
import type { Target, Workload } from '../workers/target.ts';

import { Calibrate } from './Calibrate.tsx';

const gibibyte = 2 ** 30;

function Quantity(props: {
  label: string;
  unit: string;
  value: number;
  least: number;
  onSet: (value: number) => void;
}) {
  const { label, unit, value, least, onSet } = props;
  const [text, setText] = useState(String(value));
  useEffect(() => setText(String(value)), [value]);
  const read = Number(text);
  const wrong = !(Number.isFinite(read) && read >= least);
  return (
    <label className="field">
      <span>{label}</span>
      <span className="with-unit">
        <input
          type="number"
          step="any"
          min={least}
          value={text}
          aria-invalid={wrong}
          onChange={(event) => {
            setText(event.target.value);
            const x = Number(event.target.value);
            if (event.target.value !== '' && Number.isFinite(x) && x >= least) onSet(x);
          }}
          onBlur={() => setText(String(value))}
        />
        <span className="small soft">{unit}</span>
      </span>
    </label>
  );
}

/** Target, workload, look and memory of the page: one place, in force everywhere at once. */
export function SettingsDialog({ ref }: { ref: RefObject<HTMLDialogElement | null> }) {
  const { target, workload, theme } = useStore(settingsStore);
  const offline = useStore(offlineStore, (s) => s.state);
  const setTarget = (change: Partial<Target>) => setSettings({ target: { ...target, ...change } });
  const setWorkload = (change: Partial<Workload>) => setSettings({ workload: { ...workload, ...change } });
  return (
    <dialog ref={ref} aria-labelledby="settings-title" closedby="any">
      <div className="dialog-head">
        <h2 id="settings-title">Target and workload</h2>
        <button type="button" onClick={() => ref.current?.close()}>
          Done
        </button>
      </div>
      <p className="soft">
        Forecasts of fit and time are reckoned for this machine and this work, everywhere on the page, as soon as you
        change them. Kept in this browser only.
      </p>
      <fieldset>
        <legend>The machine you will run on</legend>
        <div className="fields">
          <Quantity
            label="memory for one factorization"
            unit="GiB"
            least={0.001}
            value={target.memoryBytes / gibibyte}
            onSet={(x) => setTarget({ memoryBytes: Math.round(x * gibibyte) })}
          />
          <Quantity
            label="one core, large dense fronts"
            unit="10⁹ operations/s"
            least={0.001}
            value={target.largeRate / 1e9}
            onSet={(x) => setTarget({ largeRate: x * 1e9 })}
          />
          <Quantity
            label="one core, small fronts"
            unit="10⁹ operations/s"
            least={0.001}
            value={target.smallRate / 1e9}
            onSet={(x) => setTarget({ smallRate: x * 1e9 })}
          />
          <Quantity
            label="memory bandwidth"
            unit="10⁹ bytes/s"
            least={0.001}
            value={target.bandwidth / 1e9}
            onSet={(x) => setTarget({ bandwidth: x * 1e9 })}
          />
          <Quantity
            label="cores"
            unit=""
            least={1}
            value={target.cores}
            onSet={(x) => setTarget({ cores: Math.max(1, Math.round(x)) })}
          />
          <label className="field">
            <span>width of an index</span>
            <select
              value={target.indexBytes}
              onChange={(event) => setTarget({ indexBytes: event.target.value === '8' ? 8 : 4 })}
            >
              <option value={4}>32 bits</option>
              <option value={8}>64 bits</option>
            </select>
          </label>
          <label className="field">
            <span>width of a real number</span>
            <select
              value={target.scalarBytes}
              onChange={(event) => setTarget({ scalarBytes: event.target.value === '4' ? 4 : 8 })}
            >
              <option value={8}>64 bits, double</option>
              <option value={4}>32 bits, single</option>
            </select>
          </label>
        </div>
        <Calibrate />
      </fieldset>
      <fieldset>
        <legend>The work with this pattern</legend>
        <div className="fields">
          <Quantity
            label="factorizations with this pattern"
            unit=""
            least={1}
            value={workload.factorizations}
            onSet={(x) => setWorkload({ factorizations: Math.max(1, Math.round(x)) })}
          />
          <Quantity
            label="right-hand sides for each"
            unit=""
            least={0}
            value={workload.rightHandSides}
            onSet={(x) => setWorkload({ rightHandSides: Math.max(0, Math.round(x)) })}
          />
          <Quantity
            label="refinement steps for each"
            unit=""
            least={0}
            value={workload.refinementSteps}
            onSet={(x) => setWorkload({ refinementSteps: Math.max(0, Math.round(x)) })}
          />
        </div>
      </fieldset>
      <fieldset>
        <legend>This page</legend>
        <div className="fields">
          <label className="field">
            <span>paper</span>
            <select value={theme} onChange={(event) => setSettings({ theme: event.target.value as Theme })}>
              <option value="system">as the system says</option>
              <option value="light">light</option>
              <option value="dark">dark</option>
            </select>
          </label>
          <div className="field">
            <span>kept here</span>
            <button type="button" onClick={eraseSettings}>
              Erase all settings
            </button>
          </div>
        </div>
        <p className="small soft settings-state">
          {canShare
            ? 'Workers share memory with each other. '
            : 'This host sends no isolation headers, so workers cannot share memory: each gets a copy of the matrix, and stopping a trial ends its worker. Slower to start, otherwise the same. '}
          {offline === 'ready' ? 'The page is kept in this browser and works without a network.' : null}
        </p>
      </fieldset>
    </dialog>
  );
}
