// One thread of the map, bundled by itself: runs its share of points and adds up the error of each.
import fs from 'node:fs';
import {parentPort, workerData} from 'node:worker_threads';
import {type Scenario, startRun, TraceBlock} from '#sim-core/index';
import {type MapPointResult, type MapShare} from './jobs';

const FROM_S = 12; // the start is over

const {file, points} = workerData as MapShare;
const document = JSON.parse(fs.readFileSync(file, 'utf8')) as Scenario;
const sampleS = document.controller.sampleS ?? 0.01;
const ticks = Math.floor(document.durationS / sampleS + 1e-6);
const block = new TraceBlock(ticks);

function pointResult([kp, tiS]: MapShare['points'][number]): MapPointResult {
  const run = startRun({...document, controller: {...document.controller, kp, tiS}});
  block.count = 0;
  run.advance(ticks, block);
  let errorNs = 0;
  for (let row = Math.round(FROM_S / sampleS); row < block.count; row++)
    errorNs += Math.abs(block.at(row, 'setPointN') - block.at(row, 'tensionN')) * sampleS;
  return {errorNs, ticks: block.count, isBroken: run.outcome.kind !== 'running'};
}

parentPort?.postMessage(points.map(pointResult));
