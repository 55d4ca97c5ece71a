import {type FromPlant, type ToPlant} from './run-messages';

/** Asks a plant and waits for its answer; answers come in the order of the questions. */
export interface PlantLink {
  ask(message: ToPlant): Promise<FromPlant>;
  close(): void;
}

/** A plant in a worker of its own, so that the page never waits for physics. */
export function openPlant(): PlantLink {
  const worker = new Worker(new URL('./plant.worker', import.meta.url), {type: 'module'});
  const waiting: {resolve: (answer: FromPlant) => void; reject: (error: Error) => void}[] = [];
  worker.addEventListener('message', ({data}: MessageEvent<FromPlant>) =>
    waiting.shift()?.resolve(data),
  );
  worker.addEventListener('error', (event) => {
    for (const {reject} of waiting.splice(0))
      reject(new Error(event.message || 'the plant stopped'));
  });

  return {
    ask: (message) =>
      new Promise((resolve, reject) => {
        waiting.push({resolve, reject});
        worker.postMessage(message);
      }),
    close: () => worker.terminate(),
  };
}
