import { asText, bytes, percent, seconds } from '../figures/format.ts';
import { Neatline } from '../frame/Neatline.tsx';
import type { ReadingState, Sheet } from '../state/sheets.ts';
import { closeSheet } from './closing.ts';

/** Pace and time left, once there is something to reckon from. */
function pace({ bytesDone, bytesAll, since }: ReadingState): string {
  const passed = (performance.now() - since) / 1e3;
  if (bytesDone === 0 || passed < 0.2) return '';
  const speed = bytesDone / passed;
  const left = bytesAll === null ? '' : `, about ${asText(seconds(Math.max(0, bytesAll - bytesDone) / speed))} left`;
  return `${asText(bytes(speed))}/s${left}`;
}

/** What is coming in: what, how far, how fast, and a stop. */
export function ReadingView({ sheet }: { sheet: Sheet }) {
  const reading = sheet.reading;
  if (reading === null) return null;
  const { bytesDone, bytesAll, fraction, phase } = reading;
  return (
    <Neatline className="coming">
      <div className="coming-words">
        <h2>Reading {sheet.name}</h2>
        <progress value={fraction} max={1} aria-label={`Reading ${sheet.name}`} />
        <p>
          <span className="figure">{asText(percent(Math.floor(fraction * 100) / 100))}</span> {phase}
          {bytesAll === null ? null : (
            <span className="figure">
              , {asText(bytes(bytesDone))} of {asText(bytes(bytesAll))}
            </span>
          )}
        </p>
        <p className="figure soft">{pace(reading)}&nbsp;</p>
        <button type="button" onClick={() => closeSheet(sheet.id)}>
          Stop reading
        </button>
      </div>
    </Neatline>
  );
}
