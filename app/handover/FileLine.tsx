import { useState } from 'react';
import { saveFile } from '../plot/save.ts';
import type { ListedFile } from '../workers/handoverOperations.ts';

/** One file: its name, what it is, its convention with an example, a look into it, and the button that saves it. */
export function FileLine(props: {
  file: ListedFile;
  /** without what tells matrix and ordering */
  shortName: string;
  busy: boolean;
  make: () => Promise<Blob | null>;
  preview: () => Promise<string>;
}) {
  const { file, shortName, busy, make, preview } = props;
  const [text, setText] = useState<string | null>(null);
  const save = async () => {
    const bytes = await make();
    if (bytes !== null) saveFile(file.name, bytes, file.type);
  };
  const read = async () => {
    const bytes = await make();
    if (bytes === null) return;
    const url = URL.createObjectURL(bytes);
    window.open(url, '_blank', 'noopener');
    // the new page has loaded it by then
    setTimeout(() => URL.revokeObjectURL(url), 60_000);
  };
  const look = async () => setText(text === null ? await preview() : null);
  const costly = file.group === 'factors';
  return (
    <li className="handover-file">
      <div className="handover-file-head">
        <span className="handover-file-name figure">{shortName}</span>
        {file.refused !== null ? null : (
          <span className="handover-file-actions">
            {file.type === 'text/html' ? (
              <button type="button" className="plain small" disabled={busy} onClick={() => void read()}>
                read it<span className="unseen"> in a new tab: {shortName}</span>
              </button>
            ) : costly ? null : (
              <button type="button" className="plain small" aria-expanded={text !== null} onClick={() => void look()}>
                {text === null ? 'look' : 'close'}
                <span className="unseen"> {shortName}</span>
              </button>
            )}
            <button type="button" className="small" disabled={busy} onClick={() => void save()}>
              {busy ? 'Making…' : 'Save'}
              <span className="unseen"> {shortName}</span>
            </button>
          </span>
        )}
      </div>
      <p className="small">{file.what}.</p>
      {file.refused === null ? null : <p className="small handover-refused">Not made: {file.refused}</p>}
      {file.convention === null ? null : (
        <details className="convention small">
          <summary>convention{file.convention.example.length === 0 ? '' : ' and example'}</summary>
          <p>{file.convention.formula}</p>
          {file.convention.example.length === 0 ? null : <pre>{file.convention.example.join('\n')}</pre>}
        </details>
      )}
      {text === null ? null : (
        // biome-ignore lint/a11y/noNoninteractiveTabindex: a box that scrolls must be reachable by keys
        <section className="handover-look" tabIndex={0} aria-label={`Beginning of ${shortName}`}>
          <pre className="small">{text}</pre>
        </section>
      )}
    </li>
  );
}
