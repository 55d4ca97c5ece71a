// What a browser is given: the engine and the sessions to be lived, as one script for a page and for its worker.
import {live, type Plan} from './plans';

/** Lives sessions given as JSON; so does what came of them go back. */
function liveAll(json: string): string {
  return JSON.stringify((JSON.parse(json) as Plan[]).map(live));
}

/** The same in a worker, where the page's engine runs. */
function liveInWorker(json: string): Promise<string> {
  const worker = new Worker('/probe.js');
  return new Promise((resolve, reject) => {
    worker.onmessage = ({data}: MessageEvent<string>) => resolve(data);
    worker.onerror = ({message}) => reject(new Error(message));
    worker.postMessage(json);
  }).finally(() => worker.terminate()) as Promise<string>;
}

/** Reached from the drivers of the browsers. */
export interface Probe {
  readonly page: (json: string) => string;
  readonly worker: (json: string) => Promise<string>;
}

const scope = globalThis as unknown as {
  document?: unknown;
  probe?: Probe;
  onmessage?: (event: MessageEvent<string>) => void;
  postMessage: (message: string) => void;
};
if (scope.document === undefined) scope.onmessage = ({data}) => scope.postMessage(liveAll(data));
else scope.probe = {page: liveAll, worker: liveInWorker};
