import {TestBed} from '@angular/core/testing';
import {type LiveSettings} from '#sim-core/index';
import {aStand} from '../test-support/plant-here';
import {SettingsPanel} from './settings-panel';

async function aPanel(inputs: Readonly<Record<string, unknown>> = {}) {
  const document = aStand();
  const fixture = TestBed.createComponent(SettingsPanel);
  const all = {settings: document.controller, document, ...inputs};
  for (const [name, value] of Object.entries(all)) fixture.componentRef.setInput(name, value);
  fixture.autoDetectChanges();
  await fixture.whenStable();
  const changes: LiveSettings[] = [];
  fixture.componentInstance.changed.subscribe((change) => changes.push(change));
  const host = fixture.nativeElement as HTMLElement;
  const labels = (): string[] => [...host.querySelectorAll('label')].map((l) => l.textContent);
  const press = async (name: string): Promise<void> => {
    const button = [...host.querySelectorAll('button')].find(
      (b) => (b.getAttribute('aria-label') ?? b.textContent.trim()) === name,
    );
    button!.click();
    await fixture.whenStable();
  };
  return {fixture, host, changes, labels, press};
}

describe('SettingsPanel', () => {
  it('shows three fields at first', async () => {
    const {labels} = await aPanel();

    expect(labels()).toEqual(['Tension set point', 'Gain', 'Integral time']);
  });

  it('shows Starting once the line was started', async () => {
    const {labels} = await aPanel({shownGroups: ['Starting']});

    expect(labels()).toContain('Start ramp');
    expect(labels()).not.toContain('Stop-hold boost');
  });

  it('opens the rest and closes it again', async () => {
    const {labels, press} = await aPanel();

    await press('More settings');
    expect(labels()).toContain('Holding brake');

    await press('Fewer settings');
    expect(labels().length).toBe(3);
  });

  it('steps the gain by a factor and the set point by newtons', async () => {
    const {changes, press} = await aPanel();

    await press('More: Gain');
    await press('Less: Tension set point');

    expect(changes).toEqual([{kp: 0.22}, {setPointN: 195}]);
  });

  it('gives "off" a choice of its own', async () => {
    const {changes, press} = await aPanel();

    await press('Off: Integral time');

    expect(changes).toEqual([{tiS: 0}]);
  });

  it('says why a setting can not be changed in an exercise', async () => {
    const {host, changes, press} = await aPanel({allowed: {tiS: {lowest: 0.1, highest: 5}}});

    await press('More: Tension set point');

    expect(changes).toEqual([]);
    expect(host.textContent).toContain('Fixed in this exercise.');
  });

  it('names the range of an exercise when a value is outside it', async () => {
    const {fixture, host} = await aPanel({allowed: {tiS: {lowest: 0.1, highest: 5}}});
    const label = [...host.querySelectorAll('label')].find(
      (l) => l.textContent === 'Integral time',
    )!;
    const input = host.querySelector<HTMLInputElement>(`#${label.htmlFor}`)!;

    input.value = '7,5';
    input.dispatchEvent(new Event('input'));
    input.dispatchEvent(new KeyboardEvent('keydown', {key: 'Enter'}));
    await fixture.whenStable();

    expect(host.textContent).toContain('Allowed: 0.1 to 5 s');
    expect(input.value).toBe('7,5');
  });

  it('shows a reference as a diameter and stores a radius', async () => {
    const {changes, host, press} = await aPanel({
      settings: {...aStand().controller, radiusRefM: 0.25},
    });
    await press('More settings');

    await press('More: Reference diameter');

    expect(host.textContent).toContain('Reference diameter');
    expect(changes[0]!.radiusRefM).toBeCloseTo(0.26, 6);
  });
});
