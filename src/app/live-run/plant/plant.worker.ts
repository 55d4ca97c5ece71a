/// <reference lib="webworker" />
import {PlantHost} from './plant-host';
import {type FromPlant, type ToPlant} from './run-messages';

const host = new PlantHost();

addEventListener('message', ({data}: MessageEvent<ToPlant>) => {
  const answer: FromPlant = host.answer(data);
  const handedOver = 'trace' in answer ? [answer.trace.rows.buffer as ArrayBuffer] : [];
  postMessage(answer, {transfer: handedOver});
});
