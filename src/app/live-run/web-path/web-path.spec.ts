import {type ComponentFixture, TestBed} from '@angular/core/testing';
import {LiveRun} from '../live-run';
import {aStand, FramesByHand, plantHere} from '../test-support/plant-here';
import {WebPath} from './web-path';

const SHAPE = {coreRadiusM: 0.05, fullRadiusM: 0.5, thicknessM: 1e-4};

describe('WebPath', () => {
  let fixture: ComponentFixture<WebPath>;
  let run: LiveRun;

  const svg = (): SVGSVGElement => (fixture.nativeElement as HTMLElement).querySelector('svg')!;
  const read = (selector: string, name: string): string =>
    svg().querySelector(selector)?.getAttribute(name) ?? '';
  const texts = (): string[] =>
    [...svg().querySelectorAll('text.name')].map((text) => text.textContent.trim());

  beforeEach(async () => {
    run = new LiveRun(undefined, plantHere, new FramesByHand());
    await run.start({document: aStand()});
    fixture = TestBed.createComponent(WebPath);
    fixture.componentRef.setInput('run', run);
    fixture.componentRef.setInput('shape', SHAPE);
    fixture.autoDetectChanges();
    await fixture.whenStable();
  });

  afterEach(() => run.close());

  it('draws the roll to scale with the view', async () => {
    await run.act({line: {command: 'run', speedMps: 5, rampS: 1}});
    await run.advance(3000);

    const drawn = Number(read('circle.roll', 'r')) / Number(read('circle.core', 'r'));
    expect(run.view!.radiusM).toBeLessThan(0.25);
    expect(drawn).toBeCloseTo(run.view!.radiusM / SHAPE.coreRadiusM, 1);
  });

  it('turns the roll as the view says', async () => {
    await run.act({line: {command: 'run', speedMps: 2, rampS: 1}});
    await run.advance(300);

    const degrees = Number(/rotate\((.*)\)/.exec(read('g:has(> path.chalk)', 'transform'))?.[1]);
    expect(degrees).toBeCloseTo((run.view!.rollRad * 180) / Math.PI, 1);
    expect(degrees).not.toBe(0);
  });

  it('hides the laps that are off the roll', async () => {
    const seen = [...svg().querySelectorAll('.laps circle')].filter(
      (ring) => ring.getAttribute('visibility') === 'visible',
    );

    const rollR = Number(read('circle.roll', 'r'));
    expect(seen.length).toBeGreaterThan(3);
    for (const ring of seen) expect(Number(ring.getAttribute('r'))).toBeLessThan(rollR);
    await fixture.whenStable();
  });

  it('shows the measured tension, and the true one only when it may be seen', async () => {
    expect(texts()).toContain('measured tension');
    expect(texts()).not.toContain('true tension');

    fixture.componentRef.setInput('showsTruth', true);
    await fixture.whenStable();

    expect(texts()).toContain('true tension');
  });

  it('says in words what stands there, without numbers', async () => {
    expect(svg().getAttribute('aria-label')).toContain('Phase: standstill');
    expect(svg().getAttribute('aria-label')).not.toMatch(/\d/);

    await run.start({document: aStand({standstillPct: 95, startRampS: 0, kp: 5})});
    await run.act({line: {command: 'run', speedMps: 5, rampS: 0.2}});
    await run.advance(2000);
    await fixture.whenStable();

    expect(svg().getAttribute('aria-label')).toContain('broken');
  });
});
