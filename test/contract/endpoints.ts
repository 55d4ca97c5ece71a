import {pathToFileURL} from 'node:url';
import path from 'node:path';
import {type Endpoint} from '#shared/endpoint';
import {filesBelow, ROOT} from '../architecture/files';

/** One endpoint of shared/ with the name the code knows it by. */
export interface NamedEndpoint {
  readonly name: string;
  readonly file: string;
  readonly endpoint: Endpoint;
}

/** Every endpoint that a file of shared/ exports. */
export async function sharedEndpoints(): Promise<NamedEndpoint[]> {
  const files = filesBelow(['shared']).filter((file) => /(?<!\.spec)\.ts$/.test(file));
  const found: NamedEndpoint[] = [];
  for (const file of files) {
    const exported = (await import(pathToFileURL(path.join(ROOT, file)).href)) as Record<
      string,
      unknown
    >;
    for (const [name, value] of Object.entries(exported)) {
      if (isEndpoint(value)) found.push({name, file, endpoint: value});
    }
  }
  return found;
}

/** What a route or an endpoint is known by. */
export function callOf({method, path: at}: {method: string; path: string}): string {
  return `${method.toUpperCase()} ${at}`;
}

function isEndpoint(value: unknown): value is Endpoint {
  return (
    typeof value === 'object' &&
    value !== null &&
    'kind' in value &&
    'access' in value &&
    'path' in value
  );
}
