import {TestBed} from '@angular/core/testing';
import {TestbedHarnessEnvironment} from '@angular/cdk/testing/testbed';
import {MatButtonHarness} from '@angular/material/button/testing';
import {type LineCommand} from '#sim-core/index';
import {LinePanel} from './line-panel';

function aPanel(inputs: Readonly<Record<string, unknown>> = {}) {
  const fixture = TestBed.createComponent(LinePanel);
  for (const [name, value] of Object.entries(inputs)) fixture.componentRef.setInput(name, value);
  fixture.autoDetectChanges();
  const given: LineCommand[] = [];
  fixture.componentInstance.commanded.subscribe((command) => given.push(command));
  const loader = TestbedHarnessEnvironment.loader(fixture);
  const button = (text: string | RegExp) => loader.getHarness(MatButtonHarness.with({text}));
  return {fixture, given, button};
}

function type(fixture: ReturnType<typeof aPanel>['fixture'], label: string, text: string): void {
  const host = fixture.nativeElement as HTMLElement;
  const named = [...host.querySelectorAll('label')].find((l) => l.textContent === label)!;
  const input = host.querySelector<HTMLInputElement>(`#${named.htmlFor}`)!;
  input.value = text;
  input.dispatchEvent(new Event('input'));
  input.dispatchEvent(new KeyboardEvent('keydown', {key: 'Enter'}));
}

describe('LinePanel', () => {
  it('starts the line to a speed typed in m/min', async () => {
    const {fixture, given, button} = aPanel();

    type(fixture, 'To', '90');
    type(fixture, 'in', '8');
    await (await button(/Start the line/)).click();

    expect(given).toEqual([{command: 'run', speedMps: 1.5, rampS: 8}]);
  });

  it('keeps what was typed and gives no new speed when it is not allowed', async () => {
    const {fixture, given, button} = aPanel();

    type(fixture, 'To', '9000');
    await (await button(/Start the line/)).click();

    expect(given).toEqual([{command: 'run', speedMps: 2, rampS: 10}]);
    expect((fixture.nativeElement as HTMLElement).textContent).toContain('Allowed: 6 to 600 m/min');
  });

  it('stops a line that runs, not one that stands', async () => {
    const {fixture, given, button} = aPanel();
    expect(await (await button('Stop')).isDisabled()).toBeTrue();

    fixture.componentRef.setInput('stands', false);
    await (await button('Stop')).click();

    expect(given).toEqual([{command: 'stop', rampS: 4}]);
  });

  it('says of the fast stop that it is not the emergency stop', async () => {
    const {button} = aPanel({stands: false});

    expect(await (await button(/Fast stop/)).getText()).toContain('not the emergency stop');
  });

  it('offers only the commands that are allowed, within their ranges', async () => {
    const {given, button, fixture} = aPanel({
      commands: [{command: 'run', speedMps: [1, 1], rampS: [5, 5]}],
    });

    await (await button(/Start the line/)).click();

    expect(given).toEqual([{command: 'run', speedMps: 1, rampS: 5}]);
    expect((fixture.nativeElement as HTMLElement).textContent).not.toContain('Fast stop');
  });

  it('gives no command when the run is over', async () => {
    const {button} = aPanel({isOver: true, stands: false});

    expect(await (await button(/Change speed/)).isDisabled()).toBeTrue();
    expect(await (await button('Stop')).isDisabled()).toBeTrue();
  });
});
