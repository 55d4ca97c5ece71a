import {Worker} from 'node:worker_threads';
import {pathToFileURL} from 'node:url';
import {mapPoint} from './cases';

/** Points along each side of the map. */
export const SIDE = 32;

/** Seconds that a map of SIDE × SIDE runs of 60 s takes, shared out to `workers` threads. */
export async function mapTime(engineFile: string, workers: number): Promise<number> {
  const script = `
    import {parentPort} from 'node:worker_threads';
    import {startRun} from ${JSON.stringify(pathToFileURL(engineFile).href)};
    parentPort.on('message', (documents) => {
      for (const each of documents) startRun(each).advance(6000);
      parentPort.postMessage(documents.length);
    });
    parentPort.postMessage(0);`;
  const url = new URL(`data:text/javascript,${encodeURIComponent(script)}`);
  const threads = Array.from({length: workers}, () => new Worker(url));
  await Promise.all(threads.map(nextMessage)); // each has loaded the engine

  const documents = Array.from({length: SIDE * SIDE}, (_, place) =>
    mapPoint(0.02 + 0.004 * (place % SIDE), 0.1 + 0.03 * Math.floor(place / SIDE)),
  );
  const from = process.hrtime.bigint();
  const shares = threads.map(async (thread, which) => {
    const answer = nextMessage(thread);
    thread.postMessage(documents.filter((_, place) => place % workers === which));
    await answer;
  });
  await Promise.all(shares);
  const seconds = Number(process.hrtime.bigint() - from) / 1e9;
  await Promise.all(threads.map((thread) => thread.terminate()));
  return seconds;
}

function nextMessage(thread: Worker): Promise<unknown> {
  return new Promise((resolve, reject) => {
    thread.once('message', resolve);
    thread.once('error', reject);
  });
}
