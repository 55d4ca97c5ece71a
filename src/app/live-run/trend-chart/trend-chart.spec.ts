import {type ComponentFixture, TestBed} from '@angular/core/testing';
import {LiveRun} from '../live-run';
import {aStand, FramesByHand, plantHere} from '../test-support/plant-here';
import {TrendChart} from './trend-chart';

describe('TrendChart', () => {
  let fixture: ComponentFixture<TrendChart>;
  let run: LiveRun;

  const host = (): HTMLElement => fixture.nativeElement as HTMLElement;
  const press = async (name: string): Promise<void> => {
    [...host().querySelectorAll('button')].find((b) => b.textContent.trim() === name)!.click();
    await fixture.whenStable();
  };
  const drag = async (byPx: number): Promise<void> => {
    const area = host().querySelector('.plots')!;
    const send = (type: string, clientX: number): void => {
      area.dispatchEvent(new PointerEvent(type, {clientX, button: 0, pointerId: 1, bubbles: true}));
    };
    spyOn(area, 'setPointerCapture');
    send('pointerdown', 300);
    send('pointermove', 300 + byPx);
    send('pointerup', 300 + byPx);
    await fixture.whenStable();
  };

  beforeEach(async () => {
    run = new LiveRun(undefined, plantHere, new FramesByHand());
    await run.start({document: aStand()});
    fixture = TestBed.createComponent(TrendChart);
    fixture.componentRef.setInput('run', run);
    fixture.componentRef.setInput('topN', 400);
    fixture.componentRef.setInput('largestRadiusM', 0.5);
    fixture.autoDetectChanges();
    await run.act({line: {command: 'run', speedMps: 2, rampS: 5}});
    await run.advance(9000);
    await fixture.whenStable();
  });

  afterEach(() => run.close());

  it('draws three plots on canvases', () => {
    expect(host().querySelectorAll('canvas').length).toBe(3);
  });

  it('reads the newest value of every trace', () => {
    const text = host().querySelector('.readings')!.textContent;

    expect(text).toContain('90.0 s');
    expect(text).toContain('120 m/min');
    expect(text).toContain(`${run.trace.at(8999, 'measuredN').toFixed(0)} N`);
  });

  it('looks back when it is dragged to the right, and follows again on request', async () => {
    await drag(120);

    const slider = host().querySelector<HTMLInputElement>('input[type=range]');
    expect(Number(slider?.value)).toBeLessThan(90);
    expect(Number(slider?.value)).toBeGreaterThanOrEqual(60);

    await press('Follow the run');
    expect(host().querySelector('input[type=range]')).toBeNull();
  });

  it('takes no shaky finger for a drag', async () => {
    await drag(3);

    expect(host().querySelector('input[type=range]')).toBeNull();
  });

  it('shows the whole run on request', async () => {
    await press('All');
    await press('Hold the trend');

    expect(host().querySelector<HTMLInputElement>('input[type=range]')?.min).toBe('90');
  });

  it('has the true tension among its readings only when it may be seen', async () => {
    const labels = (): string => host().querySelector('.readings')!.textContent;
    expect(labels()).not.toContain('true');

    fixture.componentRef.setInput('showsTruth', true);
    await fixture.whenStable();

    expect(labels()).toContain('true');
  });
});
