import { useStore } from 'zustand';
import { Neatline } from '../frame/Neatline.tsx';
import { offlineStore } from '../offline/register.ts';
import { ChooseFiles } from './ChooseFiles.tsx';

/** The first sight: an empty survey sheet that waits for a file. */
export function DropArea() {
  const offline = useStore(offlineStore, (s) => s.state);
  return (
    <Neatline className="empty-sheet">
      <svg className="diagonal" preserveAspectRatio="none" viewBox="0 0 100 100" aria-hidden="true" focusable="false">
        <path d="M0 0L100 100" vectorEffect="non-scaling-stroke" />
      </svg>
      <span className="corner corner-first small">row 1, column 1</span>
      <span className="corner corner-last small">row n, column n</span>
      <div className="drop-words">
        <h2>Drop a matrix on this sheet</h2>
        <p>
          Matrix Market, Harwell–Boeing, Rutherford–Boeing or plain triplets, also in gzip, zip or tar. A right-hand
          side, a permutation, labels or coordinates may come along.
        </p>
        <p>
          <ChooseFiles label="Choose files…" lead />
        </p>
        <div className="private">
          <p>
            <strong>Files never leave this machine.</strong>{' '}
            {offline === 'ready' ? 'Ready offline: you may cut the network now.' : null}
          </p>
          <details>
            <summary className="small">How to check that</summary>
            <p className="small">
              The page is loaded under a policy that forbids it to talk to any other place, and it asks its own host for
              nothing once it is loaded. Watch the network panel of your browser while you work, or cut the network
              first: everything still works, exports included.
            </p>
          </details>
        </div>
      </div>
    </Neatline>
  );
}
