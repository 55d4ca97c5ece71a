import {filesBelow} from './files';
import {importsOf, objection} from './import-table';

describe('the import table', () => {
  it('is kept by every file', () => {
    const files = filesBelow().filter((file) => file.endsWith('.ts'));

    const broken = files
      .flatMap((file) => importsOf(file))
      .map((each) => ({...each, why: objection(each)}))
      .filter(({why}) => why !== undefined)
      .map(({from, to, why}) => `${from} imports ${to}: ${why ?? ''}`);

    expect(broken).toEqual([]);
    expect(files.length).toBeGreaterThan(20); // the walk found the project
  });

  it('has index.ts only at the doors of sim-core', () => {
    const barrels = filesBelow().filter((file) => file.endsWith('/index.ts'));

    expect(barrels.filter((file) => !/^sim-core\/(analysis\/)?index\.ts$/.test(file))).toEqual([]);
  });

  // A table that objects to nothing would pass above: each row of it is broken once here.
  const broken: readonly (readonly [file: string, text: string])[] = [
    ['sim-core/plant/roll.ts', "import * as z from 'zod';"],
    ['sim-core/plant/roll.ts', "import {pid} from '../control/pid';"],
    ['sim-core/control/pid.ts', "export {roll} from '../plant/roll';"],
    ['sim-core/run/run.ts', "import {Run} from '#shared/runs/run';"],
    ['sim-core/run/run.ts', "import {fit} from '../analysis/fit/fit';"],
    ['shared/runs/run.ts', "import express from 'express';"],
    ['shared/runs/run.ts', "import {startRun} from '#sim-core/run/simulation';"],
    ['shared/runs/run.ts', "import type {Server} from '../../server/app';"],
    ['server/app.ts', "import {Simulation} from '#sim-core/run/simulation';"],
    ['server/app.ts', "import {Bench} from '../src/app/bench/bench-page';"],
    ['server/features/a/a-routes.ts', "import {B} from '../b/b-entity';"],
    ['src/app/bench/bench-page.ts', "import {X} from '../exercises/exercise-list';"],
    ['src/app/bench/bench-page.ts', "const x = import('../../../server/app');"],
    ['src/app/ui/button.ts', "import {X} from '../bench/bench-page';"],
    ['test/support/x.ts', "import {X} from '../../server/features/a/a-service';"],
    ['tools/x.ts', "import {X} from '../src/app/app';"],
  ];
  for (const [file, text] of broken) {
    it(`objects when ${file} has ${text}`, () => {
      expect(importsOf(file, text).map(objection)).toEqual([jasmine.any(String)]);
    });
  }

  const kept: readonly (readonly [file: string, text: string])[] = [
    ['shared/runs/run.ts', "import {type RunView} from '#sim-core/run/run';"],
    ['shared/runs/run.ts', "import {FIELDS} from '#sim-core/scenario/fields';"],
    ['server/features/a/a-routes.ts', "import {B} from '../b/b-service';"],
    ['src/app/bench/bench-page.ts', "import {X} from '../live-run/frame-loop';"],
    ['src/app/today/today-page.ts', "import {Session} from '../session/session';"],
    ['src/app/app.routes.ts', "const x = import('./bench/bench-routes');"],
    ['sim-core/plant/roll.spec.ts', "import fc from 'fast-check';"],
  ];
  for (const [file, text] of kept) {
    it(`lets ${file} have ${text}`, () => {
      expect(importsOf(file, text).map(objection)).toEqual([undefined]);
    });
  }
});
