import { useEffect, useState } from 'react';
import { useStore } from 'zustand';
import { saveFile } from '../plot/save.ts';
import { notify } from '../state/notices.ts';
import { settingsStore } from '../state/settings.ts';
import type { Sheet } from '../state/sheets.ts';
import type { Trial } from '../state/trial.ts';
import { pool } from '../state/vault.ts';
import { useFigures } from '../trials/useFigures.ts';
import type { HandoverAsk, ListedFile } from '../workers/handoverOperations.ts';
import type { Failure } from '../workers/protocol.ts';
import { FileLine } from './FileLine.tsx';
import { stemOf } from './names.ts';
import { handoverAsk, recipeOf, reportPicturesOfPage } from './request.ts';

const groups: readonly { readonly group: ListedFile['group']; readonly title: string }[] = [
  { group: 'papers', title: 'To read, to keep, to replay' },
  { group: 'order', title: 'Order of the unknowns' },
  { group: 'rows and scalings', title: 'Rows and scalings' },
  { group: 'matrix', title: 'Matrix' },
  { group: 'structure', title: 'Structure of the factor' },
  { group: 'factors', title: 'Factors' },
];

/** How long figures must rest before the files are listed anew, milliseconds. */
const rest = 200;

function say(failure: Failure): void {
  if (failure.kind !== 'stopped') notify(failure.message, true);
}

/** Every file of a trial: what it is, its convention, a look into it, and a button that saves it. */
export function Files({ sheet, trial }: { sheet: Sheet; trial: Trial }) {
  const figures = useFigures(sheet);
  const settings = useStore(settingsStore);
  const [files, setFiles] = useState<readonly ListedFile[] | null>(null);
  const [failure, setFailure] = useState<string | null>(null);
  const [busy, setBusy] = useState<string | null>(null);

  useEffect(() => {
    const ask = handoverAsk(sheet, trial, figures, settings);
    if (ask === null) return;
    let stop = () => {};
    const timer = window.setTimeout(() => {
      const task = pool.run('handoverList', ask, { lane: 'long', priority: 5, matrices: [ask.key] });
      stop = task.stop;
      void task.reply.then((reply) => {
        if (reply.ok) setFiles(reply.value);
        setFailure(reply.ok || reply.failure.kind === 'stopped' ? null : reply.failure.message);
      });
    }, rest);
    return () => {
      clearTimeout(timer);
      stop();
    };
  }, [sheet, trial, figures, settings]);

  /** The request with all that a file needs; says why where it cannot be made. */
  const fullAsk = async (id: string | null): Promise<HandoverAsk | null> => {
    const ask = handoverAsk(sheet, trial, figures, settings);
    if (ask === null) return null;
    const withPictures = id === null || id === 'report' ? { ...ask, pictures: reportPicturesOfPage() } : ask;
    if (id !== null && id !== 'recipe' && id !== 'report') return withPictures;
    const recipe = await recipeOf(sheet, trial, settings);
    if (recipe.ok) return { ...withPictures, recipe: recipe.value };
    say(recipe.failure);
    return null;
  };

  const make = async (id: string): Promise<Blob | null> => {
    setBusy(id);
    const ask = await fullAsk(id);
    const reply =
      ask === null
        ? null
        : await pool.run('handoverFile', { ...ask, id }, { lane: 'long', priority: 6, matrices: [ask.key] }).reply;
    setBusy(null);
    if (reply === null) return null;
    if (reply.ok) return reply.value;
    say(reply.failure);
    return null;
  };

  const preview = async (id: string): Promise<string> => {
    const ask = await fullAsk(id);
    if (ask === null) return '';
    const options = { lane: 'long', priority: 6, matrices: [ask.key] } as const;
    const reply = await pool.run('handoverPreview', { ...ask, id, most: 3000 }, options).reply;
    if (!reply.ok) return reply.failure.message;
    return reply.value.more ? `${reply.value.text}…` : reply.value.text;
  };

  const saveAll = async () => {
    setBusy('all');
    const ask = await fullAsk(null);
    const folder = stemOf(sheet, trial);
    const options = { lane: 'long', priority: 6, matrices: [sheet.matrix] } as const;
    const reply = ask === null ? null : await pool.run('handoverZip', { ...ask, prefix: '', folder }, options).reply;
    setBusy(null);
    if (reply === null) return;
    if (!reply.ok) return say(reply.failure);
    const { zip, left } = reply.value;
    saveFile(`${folder}.zip`, zip, 'application/zip');
    if (left.length > 0) notify(`Left out of the archive: ${left.join(' ')}`);
  };

  if (failure !== null) return <p role="alert">{failure}</p>;
  if (files === null) return <p className="soft">Listing the files…</p>;
  return (
    <div className="handover-files">
      <p className="handover-all">
        <button type="button" className="lead" disabled={busy !== null} onClick={() => void saveAll()}>
          {busy === 'all' ? 'Packing…' : 'Save all as one zip'}
        </button>
      </p>
      {groups.map(({ group, title }) => {
        const own = files.filter((f) => f.group === group);
        return own.length === 0 ? null : (
          <section key={group} aria-label={title}>
            <h3>{title}</h3>
            <ul>
              {own.map((file) => (
                <FileLine
                  key={file.id}
                  file={file}
                  shortName={file.name.slice(stemOf(sheet, trial).length + 1)}
                  busy={busy === file.id}
                  make={() => make(file.id)}
                  preview={() => preview(file.id)}
                />
              ))}
            </ul>
          </section>
        );
      })}
    </div>
  );
}
