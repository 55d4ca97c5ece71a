import {type ComponentFixture, TestBed} from '@angular/core/testing';
import {signal} from '@angular/core';
import {Session} from '../session/session';
import {BenchPage} from './bench-page';
import {KeptHere, type KeptRun} from './kept-here';
import {COATER_1} from './set-ups/coater-1';

describe('BenchPage', () => {
  let fixture: ComponentFixture<BenchPage>;
  let kept: KeptRun | null;

  const host = (): HTMLElement => fixture.nativeElement as HTMLElement;
  const buttons = (): HTMLButtonElement[] => [...host().querySelectorAll('button')];
  const button = (name: string): HTMLButtonElement | undefined =>
    buttons().find((b) => b.textContent.trim().startsWith(name));
  const until = async (isSo: () => boolean): Promise<void> => {
    while (!isSo()) await new Promise((resolve) => setTimeout(resolve, 10));
    await fixture.whenStable();
  };

  async function open(inputs: Readonly<Record<string, string>> = {}): Promise<void> {
    TestBed.configureTestingModule({
      providers: [
        {provide: Session, useValue: {units: signal('si'), me: signal(null)}},
        {provide: KeptHere, useValue: {read: () => kept, write: (run: KeptRun) => (kept = run)}},
      ],
    });
    fixture = TestBed.createComponent(BenchPage);
    for (const [name, value] of Object.entries(inputs)) fixture.componentRef.setInput(name, value);
    fixture.autoDetectChanges();
    await until(() => host().querySelector('app-web-path') !== null);
  }

  beforeEach(() => {
    localStorage.removeItem('evenspan.first-steps-seen');
    kept = null;
  });

  it('threads the web, then shows the stand, the trends and three settings', async () => {
    await open({seed: '1'});

    expect(host().querySelector('h1')?.textContent).toBe('Coater 1, unwind');
    expect(host().querySelectorAll('app-settings-panel label').length).toBe(3);
    expect(host().textContent).toContain('Press “Start the line”');
    expect(button('Stop')?.disabled).toBeTrue();
  });

  it('runs the ticks that a test asks for', async () => {
    await open({seed: '1', ticks: '2000'});
    await until(() => host().textContent.includes('20.0 s'));

    expect(host().textContent).toContain('120 m/min');
    expect(host().textContent).toContain('Turn the gain up');
  });

  it('takes another stand from the library, and keeps the run before to come back to', async () => {
    await open();
    document.dispatchEvent(new KeyboardEvent('keydown', {key: 's'}));
    await until(() => button('Change speed') !== undefined);
    const select = host().querySelector('select')!;
    select.value = 'foil-coater';
    select.dispatchEvent(new Event('change'));
    await until(() => host().querySelector('h1')?.textContent === 'Foil coater');
    await until(() => button('Back to the run before') !== undefined);

    expect(host().textContent).toContain('9 µm aluminium foil');
    expect(kept?.setUp).toBe('foil-coater');

    button('Back to the run before')!.click();
    await until(() => host().querySelector('h1')?.textContent === 'Coater 1, unwind');

    expect(select.value).toBe('coater-1');
  });

  it('starts by the key S with what stands in the fields, and pauses by P', async () => {
    await open({seed: '1'});

    document.dispatchEvent(new KeyboardEvent('keydown', {key: 's'}));
    await until(() => button('Change speed') !== undefined);
    document.dispatchEvent(new KeyboardEvent('keydown', {key: 'p'}));
    await fixture.whenStable();

    expect(host().textContent).toContain('Paused');
    expect(button('Go on')).toBeDefined();
  });

  it('takes letters typed into a field for no shortcut', async () => {
    await open({seed: '1'});
    const input = host().querySelector('app-settings-panel input')!;

    input.dispatchEvent(new KeyboardEvent('keydown', {key: 's', bubbles: true}));
    await fixture.whenStable();

    expect(button('Start the line')).toBeDefined();
  });

  it('offers to go on with the run that was left', async () => {
    kept = {
      document: COATER_1.scenario,
      entries: [{n: 1, tick: 0, kind: 'line', line: {command: 'run', speedMps: 2, rampS: 10}}],
      throughTick: 4200,
      rollSize: 'half',
    };

    await open();

    expect(host().textContent).toContain('Your last run is here: 42 s, 1 act.');
    button('Start afresh')!.click();
    await until(() => button('Back to the run before') !== undefined);
  });

  it('says when and why the web broke, and threads again by T', async () => {
    kept = {
      document: {...COATER_1.scenario, web: {...COATER_1.scenario.web, breakNPerM: 155}},
      entries: [{n: 1, tick: 0, kind: 'line', line: {command: 'run', speedMps: 2, rampS: 10}}],
      throughTick: 4200,
      rollSize: 'half',
    };
    await open();

    expect(host().querySelector('[role=alert]')?.textContent).toMatch(
      /The web broke at \d+\.\d s: \d+ N, limit/,
    );
    document.dispatchEvent(new KeyboardEvent('keydown', {key: 't'}));
    await until(() => button('Start the line')?.disabled === false);

    expect(host().querySelector('[role=alert]')).toBeNull();
  });
});
