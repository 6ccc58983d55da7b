import { useStore } from 'zustand';
import { dismiss, noticesStore } from '../state/notices.ts';

/** Words to the user in a corner, and the two live regions of the page. */
export function Notices() {
  const { notices, said } = useStore(noticesStore);
  return (
    <>
      <p className="unseen" role="status" aria-live="polite">
        {said}
      </p>
      <div className="notices">
        {notices.map(({ id, text, grave }) => (
          <div key={id} className="notice" role={grave ? 'alert' : 'status'}>
            <p>{text}</p>
            <button type="button" className="plain" onClick={() => dismiss(id)}>
              close
            </button>
          </div>
        ))}
      </div>
    </>
  );
}
