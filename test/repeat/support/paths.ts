/** A JSON object that may be changed. */
export type Document = Record<string, unknown>;

/** A deep copy of what JSON can say. */
export function copyOf(document: object): Document {
  return structuredClone(document) as Document;
}

/** What stands at a path, `web.widthM`; undefined where there is nothing. */
export function at(document: Document, path: string): unknown {
  return path
    .split('.')
    .reduce<unknown>(
      (place, key) => (isDocument(place) && Object.hasOwn(place, key) ? place[key] : undefined),
      document,
    );
}

/** Puts a value at a path whose sections are there; an own key even where its name is `__proto__`. */
export function put(document: Document, path: string, value: unknown): void {
  const [section, key] = sectionOf(document, path);
  if (section === undefined) return;
  Object.defineProperty(section, key, {
    value,
    enumerable: true,
    configurable: true,
    writable: true,
  });
}

/** Takes the key at a path out. */
export function takeOut(document: Document, path: string): void {
  const [section, key] = sectionOf(document, path);
  if (section !== undefined) Reflect.deleteProperty(section, key);
}

export function isDocument(value: unknown): value is Document {
  return typeof value === 'object' && value !== null;
}

/** The object a path ends in, if an earlier change has left it there, and its last key. */
function sectionOf(document: Document, path: string): [Document | undefined, string] {
  const dot = path.lastIndexOf('.');
  const section = dot < 0 ? document : at(document, path.slice(0, dot));
  return [isDocument(section) ? section : undefined, path.slice(dot + 1)];
}
