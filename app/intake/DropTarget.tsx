import { type ReactNode, useEffect, useState } from 'react';
import { receive } from './receive.ts';

/** Takes files dropped anywhere on the page, and shows that it would while something is dragged over it. */
export function DropTarget({ children }: { children: ReactNode }) {
  const [over, setOver] = useState(false);
  useEffect(() => {
    let depth = 0;
    const carriesFiles = (event: DragEvent) => event.dataTransfer?.types.includes('Files') ?? false;
    const enter = (event: DragEvent) => {
      if (!carriesFiles(event)) return;
      depth++;
      setOver(true);
    };
    const leave = (event: DragEvent) => {
      if (!carriesFiles(event)) return;
      depth = Math.max(0, depth - 1);
      if (depth === 0) setOver(false);
    };
    const hover = (event: DragEvent) => {
      if (carriesFiles(event)) event.preventDefault();
    };
    const drop = (event: DragEvent) => {
      depth = 0;
      setOver(false);
      if (!carriesFiles(event)) return;
      event.preventDefault();
      void receive([...(event.dataTransfer?.files ?? [])]);
    };
    window.addEventListener('dragenter', enter);
    window.addEventListener('dragleave', leave);
    window.addEventListener('dragover', hover);
    window.addEventListener('drop', drop);
    return () => {
      window.removeEventListener('dragenter', enter);
      window.removeEventListener('dragleave', leave);
      window.removeEventListener('dragover', hover);
      window.removeEventListener('drop', drop);
    };
  }, []);
  return (
    <>
      {children}
      {over ? (
        <div className="drop-veil" aria-hidden="true">
          <p>Let go: it is read on this machine and stays here</p>
        </div>
      ) : null}
    </>
  );
}
