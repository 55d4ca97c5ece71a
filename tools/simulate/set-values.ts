import {FIELDS} from '#sim-core/index';
import {UsageError} from './usage';

type Json = Record<string, unknown> | unknown[];

/**
 * Puts values into a document: `controller.kp=0.2`, `line[0].speedMps=3`; null takes a key off. What the keys may
 * hold is the document's own affair: it is read afterwards.
 */
export function setValues(document: unknown, words: readonly string[]): void {
  for (const word of words) {
    const equals = word.indexOf('=');
    if (equals < 1) throw new UsageError(`--set: ${word}, expected KEY=VALUE`);
    const path = word.slice(0, equals);
    put(document, path, valueOf(path, word.slice(equals + 1)));
  }
}

function put(document: unknown, path: string, value: unknown): void {
  const keys = path.split(/[.[\]]+/).filter((key) => key !== '');
  const last = keys.pop() ?? '';
  let into = document;
  const walked: string[] = [];
  for (const key of keys) {
    walked.push(key);
    into = isJson(into) ? (into as Record<string, unknown>)[key] : undefined;
    if (!isJson(into))
      throw new UsageError(`--set: ${path}, the document has no ${walked.join('.')}`);
  }
  if (!isJson(into)) throw new UsageError(`--set: ${path}, the document is no object`);
  if (Array.isArray(into) && !(Number(last) < into.length))
    throw new UsageError(`--set: ${path}, the list has ${into.length} entries, counted from 0`);
  const target = into as Record<string, unknown>;
  if (value === null && !Array.isArray(into)) Reflect.deleteProperty(target, last);
  else target[last] = value;
}

/** A number, true, false, null or any JSON; anything else, and one of a key's own words, is a text. */
function valueOf(path: string, word: string): unknown {
  const field = FIELDS.find((each) => each.path === path);
  if (field?.kind === 'text' || field?.choices?.includes(word) === true) return word;
  try {
    return JSON.parse(word) as unknown;
  } catch {
    return word; // ratio, conditional, a name
  }
}

function isJson(value: unknown): value is Json {
  return typeof value === 'object' && value !== null;
}
