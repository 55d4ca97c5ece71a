import type * as z from 'zod';

/** A copy of a JSON sample with the value at a dotted path replaced; undefined takes the key out. */
export function changed(sample: object, path: string, value: unknown): unknown {
  const copy = JSON.parse(JSON.stringify(sample)) as Record<string, unknown>;
  const keys = path.split('.');
  const last = keys.pop()!;
  const into = keys.reduce((at, key) => at[key] as Record<string, unknown>, copy);
  if (value === undefined) Reflect.deleteProperty(into, last);
  else into[last] = value;
  return copy;
}

/** Paths at which a schema refuses a document, dotted; an unknown key is named below its object. */
export function refusedAt(schema: z.ZodType, document: unknown): string[] {
  const {error} = schema.safeParse(document);
  return (error?.issues ?? []).flatMap((issue) => {
    const path = issue.path.map(String);
    return issue.code === 'unrecognized_keys'
      ? issue.keys.map((key) => [...path, key].join('.'))
      : [path.join('.')];
  });
}

/** The beginning of a value, for the name of a test. */
export function shown(value: unknown): string {
  return value === undefined ? 'nothing' : JSON.stringify(value).slice(0, 24);
}
