import {TestBed} from '@angular/core/testing';
import {BenchStore} from './bench-store';
import {KeptHere, type KeptRun} from './kept-here';
import {COATER_1} from './set-ups/coater-1';
import {withRadius} from './set-ups/stand';

class KeptInMemory {
  kept: KeptRun | null = null;
  read(): KeptRun | null {
    return this.kept;
  }
  write(kept: KeptRun): void {
    this.kept = structuredClone(kept);
  }
}

describe('BenchStore', () => {
  let kept: KeptInMemory;
  let store: BenchStore;

  function aStore(): BenchStore {
    TestBed.resetTestingModule();
    TestBed.configureTestingModule({
      providers: [BenchStore, {provide: KeptHere, useValue: kept}],
    });
    store = TestBed.inject(BenchStore);
    return store;
  }

  async function aRunOfAPerson(): Promise<void> {
    await aStore().open(null);
    await store.change({kp: 0.44});
    await store.command({command: 'run', speedMps: 2, rampS: 5});
    store.run.halt('byPerson');
    await store.run.advance(500);
    store.keepNow();
  }

  beforeEach(() => (kept = new KeptInMemory()));
  afterEach(() => store.run.close());

  it('begins with the half roll, threaded and at rest', async () => {
    await aStore().open(null);

    expect(store.rollSize()).toBe('half');
    expect(store.run.view?.radiusM).toBeCloseTo(0.25, 9);
    expect(store.run.view?.tensionN).toBeCloseTo(150, 6);
    expect(store.offersToGoOn()).toBeFalse();
  });

  it('holds its tension at rest with its own holding brake', async () => {
    await aStore().open(null);

    await store.run.advance(1000);

    expect(store.run.view?.tensionN).toBeCloseTo(150, 0);
  });

  it('keeps an act before it is shown', async () => {
    await aStore().open(null);

    await store.change({kp: 0.44});

    expect(kept.kept?.entries.length).toBe(1);
  });

  it('offers a run that was left, at the tick and fingerprint it had', async () => {
    await aRunOfAPerson();
    const hash = await store.run.hash();
    const {tick} = store.run.view!;
    store.run.close();

    await aStore().open(null);

    expect(store.offersToGoOn()).toBeTrue();
    expect(store.run.view?.tick).toBe(tick);
    expect(await store.run.hash()).toBe(hash);

    store.goOn();
    expect(store.offersToGoOn()).toBeFalse();
  });

  it('leaves a kept run alone when a test asks for a seed', async () => {
    await aRunOfAPerson();
    const before = kept.kept;
    store.run.close();

    await aStore().open(5);
    await store.change({kp: 1});

    expect(kept.kept).toEqual(before);
  });

  it('keeps the settings when another roll is chosen, and the run before within reach', async () => {
    await aRunOfAPerson();
    const hash = await store.run.hash();

    await store.chooseRoll('small');
    expect(store.run.settings()['kp']).toBe(0.44);
    expect(store.run.view?.radiusM).toBeCloseTo(0.1, 9);
    expect(store.canGoBack()).toBeTrue();

    await store.goBack();
    expect(store.rollSize()).toBe('half');
    expect(await store.run.hash()).toBe(hash);
  });

  it('threads again with the settings of the broken run', async () => {
    await aStore().open(null);
    await store.chooseRoll('small');
    await store.change({kp: 5, standstillPct: 60});
    await store.command({command: 'run', speedMps: 5, rampS: 0.5});
    store.run.halt('byPerson');
    await store.run.advance(3000);
    expect(store.run.outcome().kind).toBe('webBroke');

    await store.threadAgain();

    expect(store.run.outcome().kind).toBe('running');
    expect(store.run.settings()['kp']).toBe(5);
  });

  it('shows the settings of starting and stopping when they matter', async () => {
    await aStore().open(null);
    expect(store.shownGroups()).toEqual([]);

    await store.command({command: 'run', speedMps: 2, rampS: 5});
    expect(store.shownGroups()).toEqual(['Starting']);

    await store.command({command: 'stop', rampS: 4});
    expect(store.shownGroups()).toEqual(['Starting', 'Stopping', 'Standstill']);
  });
});

describe('withRadius', () => {
  for (const radiusM of [0.1, 0.25, 0.5]) {
    it(`sets a holding brake that can hold the job's tension, no stronger than a step, radius ${radiusM} m`, () => {
      const {brake, controller} = withRadius(COATER_1.scenario, radiusM);

      // holding torque = residual + share of the rest; web torque = tension × radius
      const residualNm = brake.residualTorqueNm ?? 0;
      const stepNm = (brake.maxTorqueNm - residualNm) / 100;
      const holdsNm = residualNm + stepNm * controller.standstillPct;
      const neededNm = controller.setPointN * radiusM;
      expect(holdsNm).toBeGreaterThanOrEqual(neededNm);
      expect(holdsNm - neededNm).toBeLessThan(stepNm);
    });
  }
});
