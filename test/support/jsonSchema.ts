/** A small check of JSON against a schema (JSON Schema 2020-12, the keywords our schema uses; any other keyword is an error). */

type Json = null | boolean | number | string | readonly Json[] | { readonly [key: string]: Json };
type Schema = { readonly [key: string]: Json };

const annotations = new Set(['$schema', 'title', 'description']);

/** Paths and sentences of everything that does not fit; empty when all does. */
export function schemaFaults(value: Json, schema: Schema, path = '$'): string[] {
  const out: string[] = [];
  for (const [keyword, rule] of Object.entries(schema)) {
    if (annotations.has(keyword)) continue;
    const check = keywords[keyword];
    if (check === undefined) throw new Error(`the check does not know the keyword ${keyword}`);
    out.push(...check(value, rule, path, schema));
  }
  return out;
}

const isObject = (v: Json): v is { readonly [key: string]: Json } =>
  typeof v === 'object' && v !== null && !Array.isArray(v);

function typeOf(v: Json): string {
  if (v === null) return 'null';
  if (Array.isArray(v)) return 'array';
  return typeof v;
}

type Keyword = (value: Json, rule: Json, path: string, schema: Schema) => string[];
const when = (fails: boolean, text: string): string[] => (fails ? [text] : []);

const keywords: Readonly<Record<string, Keyword>> = {
  type: (v, rule, path) =>
    when(
      rule === 'integer' ? !Number.isInteger(v) : typeOf(v) !== rule,
      `${path}: expected ${String(rule)}, found ${typeOf(v)}`,
    ),
  const: (v, rule, path) => when(v !== rule, `${path}: expected ${String(rule)}`),
  enum: (v, rule, path) => when(!(rule as Json[]).includes(v), `${path}: ${String(v)} is not among the words`),
  minimum: (v, rule, path) => when(typeof v === 'number' && v < Number(rule), `${path}: below ${String(rule)}`),
  maximum: (v, rule, path) => when(typeof v === 'number' && v > Number(rule), `${path}: above ${String(rule)}`),
  exclusiveMinimum: (v, rule, path) =>
    when(typeof v === 'number' && v <= Number(rule), `${path}: not above ${String(rule)}`),
  minItems: (v, rule, path) => when(Array.isArray(v) && v.length < Number(rule), `${path}: too few items`),
  maxItems: (v, rule, path) => when(Array.isArray(v) && v.length > Number(rule), `${path}: too many items`),
  items: (v, rule, path) =>
    Array.isArray(v) ? v.flatMap((x, k) => schemaFaults(x as Json, rule as Schema, `${path}[${k}]`)) : [],
  anyOf: (v, rule, path) => {
    const faults = (rule as Schema[]).map((s) => schemaFaults(v, s, path));
    return faults.some((f) => f.length === 0) ? [] : faults.flat();
  },
  required: (v, rule, path) =>
    isObject(v) ? (rule as string[]).filter((k) => !(k in v)).map((k) => `${path}.${k}: missing`) : [],
  properties: (v, rule, path) =>
    isObject(v)
      ? Object.entries(rule as Record<string, Schema>).flatMap(([k, s]) =>
          k in v ? schemaFaults(v[k], s, `${path}.${k}`) : [],
        )
      : [],
  additionalProperties: (v, rule, path, { properties }) =>
    rule === false && isObject(v)
      ? Object.keys(v)
          .filter((k) => !(k in (properties as object)))
          .map((k) => `${path}.${k}: not in the schema`)
      : [],
};
