/* global describe, it, expect, beforeEach, afterEach */
import {spawnSync} from 'node:child_process';
import fs from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import {ROOT} from '../modules.mjs';

const REFERENCE = path.join(ROOT, 'sim-core/reference/b-start-step-stop.json');

describe('simulate', () => {
  let folder;
  const place = (name) => path.join(folder, name);

  /** Runs the program; answers exit code, standard output, and the one line of standard error. */
  function simulate(...words) {
    const program = path.join(ROOT, 'tools', 'simulate.ts');
    const {status, stdout, stderr} = spawnSync(
      process.execPath,
      ['--import', 'tsx', program, ...words],
      {cwd: ROOT, encoding: 'utf8', maxBuffer: 64 * 1024 * 1024},
    );
    return {status, stdout, stderr};
  }

  /** A document of a few seconds in a file. */
  function document(changes = {}) {
    const scenario = {...JSON.parse(fs.readFileSync(REFERENCE, 'utf8')), durationS: 3, ...changes};
    fs.writeFileSync(place('document.json'), JSON.stringify(scenario));
    return place('document.json');
  }

  beforeEach(() => {
    folder = fs.mkdtempSync(path.join(os.tmpdir(), 'evenspan-simulate-'));
  });

  afterEach(() => {
    fs.rmSync(folder, {recursive: true, force: true});
  });

  it('writes the rows, first at 0, last at the end of the run', () => {
    const {status, stdout} = simulate(document(), '--every', '0.5');
    const [head, ...rows] = stdout.trim().split('\n');

    expect(status).toBe(0);
    expect(head.startsWith('t_s,tension_N,measured_N,setpoint_N')).toBeTrue();
    expect(rows.map((row) => row.split(',')[0])).toEqual(['0', '0.5', '1', '1.5', '2', '2.5', '3']);
  });

  it('changes keys before it runs, list items and texts as well, and takes a key off', () => {
    const file = document({line: [{atS: 1, command: 'run', speedMps: 4, rampS: 8}], actions: []});
    const words = [
      'line[0].speedMps=0.5',
      'line[0].rampS=0',
      'controller.radiusSource=true',
      'controller.radiusRefM=null',
      'name=7 of 9',
    ].flatMap((word) => ['--set', word]);
    const {status, stdout, stderr} = simulate(file, ...words, '--every', '1');

    expect(stderr).toBe('');
    expect(status).toBe(0);
    expect(stdout.trim().split('\n').at(-1).split(',')[5]).toBe('0.5');
  });

  it('measures the whole run and each window', () => {
    const {status} = simulate(
      document({durationS: 25}),
      '--out',
      place('rows.csv'),
      '--measures',
      place('measures.json'),
      '--events',
      place('events.json'),
    );
    const {whole, windows} = JSON.parse(fs.readFileSync(place('measures.json'), 'utf8'));
    const rows = fs.readFileSync(place('rows.csv'), 'utf8').trim().split('\n').slice(1, -1);
    const tensions = rows.map((row) => Number(row.split(',')[1]));

    expect(status).toBe(0);
    expect(windows.map(({fromS, act}) => [fromS, act])).toEqual([
      [1, 'run'],
      [18, 'set point'],
    ]);
    // the rows of the CSV are the same run's, rounded to 9 digits
    expect(whole.peakN).toBeCloseTo(Math.max(...tensions), 5);
    expect(windows[1].measures.riseTimeS).toBeGreaterThan(0);
    expect(windows[0].measures.riseTimeS).toBeNull();
    expect(JSON.parse(fs.readFileSync(place('events.json'), 'utf8'))[0].kind).toBe('phase');
  });

  it('ends with 2 and one line naming key and value', () => {
    const file = document();
    const wrong = [
      [['--set', 'controller.kp=2000'], 'simulate: controller.kp: 2000, allowed: 0 … 1000 %/%'],
      [['--set', 'controller.kpp=1'], 'simulate: controller.kpp: 1, allowed: no such key'],
      [['--set', 'foo.bar=1'], 'simulate: --set: foo.bar, the document has no foo'],
      [['--set', 'line[9].rampS=1'], 'simulate: --set: line[9].rampS, the document has no line.9'],
      [['--set', 'kp'], 'simulate: --set: kp, expected KEY=VALUE'],
      [
        ['--every', '0.003'],
        'simulate: --every: 0.003, allowed: a whole multiple of sampleS (0.01 s)',
      ],
    ];
    for (const [words, line] of wrong) {
      const {status, stderr, stdout} = simulate(file, ...words);

      expect(status).toBe(2);
      expect(stderr).toBe(`${line}\n`);
      expect(stdout).toBe('');
    }
  });

  it('ends with 2 for a file that is not there or no JSON', () => {
    fs.writeFileSync(place('broken.json'), '{"format":');

    for (const name of ['nothing.json', 'broken.json']) {
      const {status, stderr} = simulate(place(name));

      expect(status).toBe(2);
      expect(stderr.split('\n').length).toBe(2);
      expect(stderr).toContain(name);
    }
  });
});
