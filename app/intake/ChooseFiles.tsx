import { useRef } from 'react';
import { receive } from './receive.ts';

/** A button that opens the browser's own file chooser. */
export function ChooseFiles({ label, lead = false }: { label: string; lead?: boolean }) {
  const input = useRef<HTMLInputElement>(null);
  return (
    <>
      <button type="button" className={lead ? 'lead' : ''} onClick={() => input.current?.click()}>
        {label}
      </button>
      <input
        ref={input}
        type="file"
        multiple
        hidden
        aria-label="Files to read"
        onChange={(event) => {
          void receive([...(event.target.files ?? [])]);
          event.target.value = '';
        }}
      />
    </>
  );
}
