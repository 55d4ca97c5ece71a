import {
  ChangeDetectionStrategy,
  Component,
  computed,
  input,
  linkedSignal,
  output,
} from '@angular/core';
import {MatButtonModule} from '@angular/material/button';
import {type LineCommand} from '#sim-core/index';
import {fromPerson, toPerson, unitName, type UnitSystem} from '#shared/units';
import {Icon} from '../../ui/icon';
import {NumberField} from '../../ui/number-field';

/** A command that may be given, and within which values (SI). */
export interface AllowedCommand {
  readonly command: 'run' | 'stop' | 'fastStop';
  readonly speedMps?: readonly [number, number] | undefined;
  readonly rampS: readonly [number, number];
}

/** What the free Bench allows. */
export const FREE_COMMANDS: readonly AllowedCommand[] = [
  {command: 'run', speedMps: [0.1, 10], rampS: [0, 120]},
  {command: 'stop', rampS: [0.5, 120]},
  {command: 'fastStop', rampS: [0.5, 120]},
];

/** Starts, changes and stops the line. The fast stop is a quick ordinary stop and says so. */
@Component({
  selector: 'app-line-panel',
  templateUrl: './line-panel.html',
  styleUrl: './line-panel.scss',
  imports: [Icon, MatButtonModule, NumberField],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class LinePanel {
  readonly commands = input<readonly AllowedCommand[]>(FREE_COMMANDS);
  readonly units = input<UnitSystem>('si');
  /** Whether the line stands. */
  readonly stands = input(true);
  readonly isOver = input(false);
  /** Rounding of the line's ramps [s]: the line takes this much longer than the ramp. */
  readonly roundS = input(0);
  /** Ramps and speed the fields begin with (SI). */
  readonly first = input({speedMps: 2, startS: 10, stopS: 4, fastStopS: 2.5});

  readonly commanded = output<LineCommand>();

  protected readonly speedMps = linkedSignal(() =>
    within(this.run()?.speedMps, this.first().speedMps),
  );
  protected readonly startS = linkedSignal(() => within(this.run()?.rampS, this.first().startS));
  protected readonly stopS = linkedSignal(() => within(this.stop()?.rampS, this.first().stopS));
  protected readonly fastStopS = linkedSignal(() =>
    within(this.fastStop()?.rampS, this.first().fastStopS),
  );

  protected readonly run = computed(() => this.commands().find((c) => c.command === 'run'));
  protected readonly stop = computed(() => this.commands().find((c) => c.command === 'stop'));
  protected readonly fastStop = computed(() =>
    this.commands().find((c) => c.command === 'fastStop'),
  );
  protected readonly speedUnit = computed(() => unitName('speed', this.units()));
  protected readonly speedShown = computed(() =>
    Math.round(toPerson('speed', this.speedMps(), this.units())),
  );
  protected readonly speedRange = computed(() =>
    (this.run()?.speedMps ?? [0.1, 10]).map((v) => toPerson('speed', v, this.units())),
  );
  protected readonly isSpeedFixed = computed(() => isFixed(this.run()?.speedMps));
  protected readonly isStartFixed = computed(() => isFixed(this.run()?.rampS));
  protected readonly isStopFixed = computed(() => isFixed(this.stop()?.rampS));

  protected setSpeed(shown: number): void {
    this.speedMps.set(fromPerson('speed', shown, this.units()));
  }

  giveRun(): void {
    this.commanded.emit({command: 'run', speedMps: this.speedMps(), rampS: this.startS()});
  }

  giveStop(): void {
    this.commanded.emit({command: 'stop', rampS: this.stopS()});
  }

  giveFastStop(): void {
    this.commanded.emit({command: 'fastStop', rampS: this.fastStopS()});
  }
}

function isFixed(range: readonly [number, number] | undefined): boolean {
  return range !== undefined && range[0] === range[1];
}

function within(range: readonly [number, number] | undefined, value: number): number {
  return range === undefined ? value : Math.min(range[1], Math.max(range[0], value));
}
