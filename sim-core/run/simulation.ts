import * as control from '../control/controller-state';
import {Controller} from '../control/controller';
import * as seen from '../control/seen';
import * as now from '../plant/evaluation';
import * as place from '../plant/plant-state';
import {Plant} from '../plant/plant';
import {type Grid} from '../plant/stand';
import {cellSample} from '../plant/sensing';
import {type Fault, ScenarioError} from '../scenario/faults';
import {type LineCommand, type Scenario} from '../scenario/scenario';
import {changed, type Settings, settingsOf} from '../scenario/settings';
import {withoutNegativeZeros} from '../scenario/zeros';
import {nextNormal, seedWords} from '../signal/random';
import {faultsAhead} from './act-rules';
import {Fingerprint} from './hash';
import {type Act, type EngineEntry, type LogEntry, type Note, type RunHash} from './log';
import {mixChange, mixLine} from './mix-act';
import {type Outcome, type Run, type RunEvent, type RunView, type SavedRun} from './run';
import {type Parts, viewOf, writeControl, writePlant} from './readings';
import {type Change, type Schedule, scheduleOf} from './schedule';
import {type TraceBlock} from './trace';
import {QuietTicks} from './quiet-ticks';
import * as slot from './run-state';
import {Watch} from './watch';

/** What a save holds: only to be given back to the run, or a run of the same document, that made it. */
interface Saved extends SavedRun {
  readonly state: Float64Array;
  readonly settings: Settings;
  readonly pending: readonly Act[];
  readonly events: readonly RunEvent[];
  readonly outcome: Outcome;
}

/**
 * One run: controller and plant joined, tick by tick. All numbers that change lie in one preallocated array,
 * so that a save is a copy and the fingerprint covers them. What is carried from tick to tick is rebuilt from
 * it, therefore any division of a run into calls gives the same bits.
 */
export class Simulation implements Run {
  outcome: Outcome = {kind: 'running'};

  private readonly scenario: Scenario;
  private readonly grid: Grid;
  private readonly schedule: Schedule;
  private readonly state: Float64Array;
  private readonly plantState: Float64Array;
  private readonly controlState: Float64Array;
  private readonly random: Float64Array;
  private readonly printed: Uint32Array;
  private readonly print: Fingerprint;
  private readonly plant: Plant;
  private readonly controller: Controller;
  private readonly watch: Watch;
  private readonly quiet: QuietTicks;
  private inForce: Settings;
  private pending: Act[] = [];
  private readonly parts: Parts;
  private readonly news: Float64Array;
  private readonly isDancer: boolean;

  /** The document has been checked. `isCareful`: no tick takes the hot loop's way, which the specs compare. */
  constructor(
    checked: Scenario,
    private readonly isCareful = false,
  ) {
    const scenario = withoutNegativeZeros(checked);
    this.scenario = scenario;
    const {web, brake, controller} = scenario;
    this.inForce = settingsOf(controller);
    const {sampleS, standstillPct} = this.inForce;
    const plantStepS = scenario.plantStepS ?? 0.001;
    this.grid = {sampleS, plantStepS, stepsPerTick: Math.round(sampleS / plantStepS)};
    this.schedule = scheduleOf(scenario, sampleS);

    this.state = new Float64Array(slot.PLANT + Plant.size(scenario, this.grid));
    this.plantState = this.state.subarray(slot.PLANT);
    this.controlState = this.state.subarray(slot.CONTROLLER, slot.PLANT);
    this.random = this.state.subarray(slot.RANDOM, slot.WATCH);

    this.print = new Fingerprint(this.state.subarray(slot.PRINT, slot.TICK));
    this.plant = new Plant(scenario, this.plantState, this.grid);
    const printed = this.state.subarray(slot.PRINTED, slot.PLANT + this.plant.count);
    this.printed = new Uint32Array(printed.buffer, printed.byteOffset, 2 * printed.length);
    const {now: n} = this.plant.equations;
    this.controller = new Controller(scenario, this.controlState, {
      atZero: n[now.INERTIA_AT_ZERO]!,
      perFourth: n[now.INERTIA_PER_FOURTH]!,
    });
    this.parts = {plant: this.plant, plantState: this.plantState, controlState: this.controlState};
    this.news = this.controller.news;
    this.isDancer = scenario.sensing.kind === 'dancer';
    const stretchLimit = (web.stretchLimitPct ?? 1e9) / 100;
    const watchState = this.state.subarray(slot.WATCH, slot.CONTROLLER);
    this.watch = new Watch(watchState, sampleS, stretchLimit, brake.limitC ?? 150);
    const {grid, plant, watch, state, printed: words} = this;
    const parts = {scenario, grid, plant, controller: this.controller, watch, state};
    this.quiet = new QuietTicks({...parts, printed: words});

    this.print.reset();
    seedWords(this.random, scenario.seed);
    this.plant.reset(standstillPct);
    this.controller.reset(this.inForce, this.plant.stand.radius());
  }

  get tick(): number {
    return this.state[slot.TICK]!;
  }

  get events(): readonly RunEvent[] {
    return this.watch.events;
  }

  settings(): Readonly<Record<string, unknown>> {
    return {...this.inForce};
  }

  act(act: Act): LogEntry {
    const taken = this.take(act, '');
    const stamp = this.stamp();
    if ('set' in taken) return {...stamp, kind: 'set', set: taken.set} satisfies EngineEntry;
    if ('line' in taken) return {...stamp, kind: 'line', line: taken.line} satisfies EngineEntry;
    return {...stamp, kind: 'disturb', disturb: taken.disturb} satisfies EngineEntry;
  }

  note(note: Note): LogEntry {
    return {...this.stamp(), ...note};
  }

  /** Takes an act for the next tick without a stamp; `at` names it in the faults. */
  take(act: Act, at: string): Act {
    const faults = this.faultsOf(act, at);
    if (faults.length > 0) throw new ScenarioError(faults);
    const taken = withoutNegativeZeros(act);
    this.pending.push(taken);
    return taken;
  }

  /** Counts one entry of a log. */
  stamp(): {readonly n: number; readonly tick: number} {
    this.state[slot.ENTRIES]!++;
    return {n: this.state[slot.ENTRIES]!, tick: this.tick};
  }

  advance(ticks: number, block?: TraceBlock): number {
    const room = block === undefined ? ticks : Math.min(ticks, block.capacity - block.count);
    let run = 0;
    while (run < room && this.outcome.kind === 'running') {
      run += this.quiet.advance(Math.min(room - run, this.ticksUndisturbed()), block);
      if (run >= room) break;
      this.runTick(block);
      run++;
    }
    return run;
  }

  view(): RunView {
    return viewOf(this.parts, this.tick, this.grid.sampleS, this.state[slot.SAMPLE]!);
  }

  hash(): RunHash {
    return this.print.text();
  }

  save(): SavedRun {
    const saved: Saved = {
      state: this.state.slice(),
      settings: this.inForce,
      pending: [...this.pending],
      events: [...this.watch.events],
      outcome: this.outcome,
    };
    return saved;
  }

  load(saved: SavedRun): void {
    const {state, settings, pending, events, outcome} = saved as Saved;
    this.state.set(state);
    this.inForce = settings;
    this.pending = [...pending];
    this.watch.events.splice(0, Infinity, ...events);
    this.outcome = outcome;
    this.plant.end = null;
    this.plant.stand.refresh();
    this.controller.refresh(settings);
  }

  /** One control tick, in the order of the model: commands, measure, control, move. */
  private runTick(block?: TraceBlock): void {
    const {state, controlState, plant} = this;
    const tick = state[slot.TICK]!;
    const t = tick * this.grid.sampleS;
    if (this.quiet.isOpen) plant.openTick(t);
    else this.openTick(tick, t, block);
    this.quiet.isOpen = false;
    plant.move(tick, controlState[control.APPLIED]!, controlState[control.SET_POINT]!);
    this.lookAround(tick);
    state[slot.TICK] = tick + 1;
  }

  /** The first half of a tick: what is due, the sample, the controller. */
  private openTick(tick: number, t: number, block?: TraceBlock): void {
    const {plantState, controlState, plant, news} = this;
    if (block !== undefined) writePlant(block, this.parts, t);
    this.applyDue(tick, t);
    plant.openTick(t);
    this.measure();
    news[seen.TICK] = tick;
    news[seen.STANDS] = this.lineStands(t) ? 1 : 0;
    news[seen.MEAN_RADIUS] = plant.stand.radius();
    news[seen.OMEGA] = plantState[place.OMEGA]!;
    news[seen.LINE_MPS] = plant.line.c0[0]!;
    news[seen.LINE_SLOPE] = plant.line.c1[0]!;
    this.controller.tick();
    this.watch.phase(tick, controlState[control.PHASE]!);
    if (block !== undefined) writeControl(block, this.parts);
  }

  /** Ticks before the next command or change. */
  private ticksUndisturbed(): number {
    const {state, schedule} = this;
    if (this.isCareful || this.pending.length > 0) return 0;
    const line = schedule.lines[state[slot.NEXT_LINE]!]?.tick ?? Infinity;
    const change = schedule.changes[state[slot.NEXT_CHANGE]!]?.tick ?? Infinity;
    return Math.max(0, Math.min(line, change) - this.tick);
  }

  /** Commands first, then changes, each the document's own before those of the log. */
  private applyDue(tick: number, t: number): void {
    const {state, news, schedule, pending} = this;
    news[seen.RAN] = 0;
    news[seen.STOPPED] = seen.NO_STOP;
    for (;;) {
      const due = schedule.lines[state[slot.NEXT_LINE]!];
      if (due === undefined || due.tick > tick) break;
      this.command(t, due.what);
      state[slot.NEXT_LINE]!++;
    }
    for (const act of pending) if ('line' in act) this.command(t, act.line);
    for (;;) {
      const due = schedule.changes[state[slot.NEXT_CHANGE]!];
      if (due === undefined || due.tick > tick) break;
      this.change(t, due.what);
      state[slot.NEXT_CHANGE]!++;
    }
    for (const act of pending) if (!('line' in act)) this.change(t, act);
    if (pending.length > 0) this.pending = [];
  }

  private command(t: number, line: LineCommand): void {
    const {news} = this;
    mixLine(this.print, line);
    this.plant.line.command(t, line);
    if (line.command === 'run') {
      news[seen.RAN] = 1;
      news[seen.STOPPED] = seen.NO_STOP; // a run takes back a stop of the same tick: the line will run
    } else if (news[seen.STOPPED] === seen.NO_STOP)
      news[seen.STOPPED] = line.command === 'fastStop' ? seen.FAST_STOP : seen.STOP;
  }

  private change(t: number, change: Change): void {
    mixChange(this.print, change);
    if ('set' in change) {
      this.inForce = changed(this.inForce, change.set);
      this.controller.refresh(this.inForce);
      const entered = change.set.radiusEnteredM;
      if (typeof entered === 'number') this.controller.enterRadius(entered);
    } else this.plant.disturb(change.disturb, this.lineStands(t));
  }

  /** One sample; one draw of the generator whatever the phase. */
  private measure(): void {
    const {plantState, news, plant} = this;
    const {now: n} = plant.equations;
    if (this.isDancer) {
      news[seen.DANCER_PCT] = (100 * plantState[place.DANCER]!) / n[now.TRAVEL]!;
      return;
    }
    const sample = cellSample(n, plantState[place.FILTER]!, nextNormal(this.random));
    news[seen.SAMPLE_N] = sample;
    this.state[slot.SAMPLE] = sample;
  }

  /** At the tick of a run the line does not stand. */
  private lineStands(t: number): boolean {
    return this.news[seen.RAN] === 0 && this.plant.line.stands(t);
  }

  private lookAround(tick: number): void {
    const {plant, plantState, controlState} = this;
    const {end} = plant;
    if (!this.isFinite()) {
      this.outcome = {kind: 'diverged', atTick: tick, atS: (tick + 1) * this.grid.sampleS};
      return;
    }
    if (end !== null) {
      const what = {kind: end.kind, atTick: tick, atS: end.atS};
      const isBreak = end.kind === 'webBroke';
      this.outcome = isBreak ? {...what, tensionN: end.tensionN} : what;
      this.watch.add(isBreak ? {...what, value: end.tensionN} : what);
    } else {
      const limit = controlState[control.LIMIT]!;
      this.watch.look(tick, {
        slackM: plant.stand.slack(),
        strain: plantState[place.STRAIN]!,
        brakeC: plantState[place.HEAT]!,
        isAtStop: plant.equations.now[now.STOP] !== 0,
        limit,
        limitPct: this.controller.limitPct(),
      });
    }
    this.print.mixAll(this.printed);
  }

  /** Whether the states that everything else follows from are finite numbers. */
  private isFinite(): boolean {
    const {plantState, controlState} = this;
    let sum = controlState[control.OUTPUT]! * 0 + controlState[control.INTEGRAL]! * 0;
    for (let i = 0; i <= place.TENSION; i++) sum += plantState[i]! * 0;
    return sum === 0;
  }

  /** Rules an act must keep: its own, and those with what it will meet. */
  private faultsOf(act: Act, at: string): Fault[] {
    if (this.outcome.kind !== 'running')
      return [{path: at, value: this.outcome.kind, allowed: 'nothing more: the run has ended'}];
    return faultsAhead(act, at, {
      scenario: this.scenario,
      tick: this.tick,
      settings: this.inForce,
      modulusPa: this.plantState[place.MODULUS]!,
      largestRadiusM: this.plantState[place.LARGEST]!,
      pending: this.pending,
      later: this.schedule.changes.slice(this.state[slot.NEXT_CHANGE]),
    });
  }
}
