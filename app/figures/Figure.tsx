import { asText, type Written } from './format.ts';

/** The kind of a number, always said beside an estimate. */
export type Kind = 'exact' | 'bound' | 'modelled' | 'measured' | 'sampled' | 'rounded' | 'value-dependent';

/** A figure in running text or a list: digits, unit, kind; the exact value on hover. */
export function Figure({ value, kind }: { value: Written; kind?: Kind }) {
  return (
    <>
      <span className="figure" title={value.exact}>
        {asText(value)}
      </span>
      {kind === undefined ? null : <span className="kind"> {kind}</span>}
    </>
  );
}
