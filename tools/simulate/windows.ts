import {
  type Measures,
  measuresOf,
  type Scenario,
  settingsOf,
  tickOf,
  type TraceRows,
  withDefaults,
} from '#sim-core/index';

/** Measures from one command or change of set point up to the next. */
interface WindowMeasures {
  readonly fromS: number;
  readonly toS: number;
  /** What the window begins with. */
  readonly act: string;
  readonly measures: Measures;
}

/** Measures of a whole run and of each of its windows. */
export interface RunMeasures {
  readonly whole: Measures;
  readonly windows: readonly WindowMeasures[];
}

interface Begin {
  readonly tick: number;
  readonly act: string;
  /** Set point from here on [N]. */
  readonly targetN: number;
  /** Set point until here, when the act changes it [N]. */
  readonly stepFromN?: number;
}

/** The set point stands in for a target: nobody gave the command line a job. */
export function measureRun(document: Scenario, rows: TraceRows): RunMeasures {
  const {sampleS, setPointN, outMinPct, outMaxPct} = settingsOf(document.controller);
  const {web} = withDefaults(document);
  const against = {
    sampleS,
    lowestPct: outMinPct,
    highestPct: outMaxPct,
    ...(web.stretchLimitPct === undefined
      ? {}
      : {
          stretchLimitN: (web.modulusPa * web.widthM * web.thicknessM * web.stretchLimitPct) / 100,
        }),
  };
  const begins = beginsOf(document, sampleS, setPointN).filter(({tick}) => tick < rows.count);
  return {
    whole: measuresOf(rows, {from: 0, to: rows.count}, {...against, targetN: setPointN}),
    windows: begins.map(({tick, act, targetN, stepFromN}, place) => {
      const to = begins[place + 1]?.tick ?? rows.count;
      const step = stepFromN === undefined ? {} : {stepFromN};
      return {
        fromS: round(tick * sampleS),
        toS: round(to * sampleS),
        act,
        measures: measuresOf(rows, {from: tick, to}, {...against, targetN, ...step}),
      };
    }),
  };
}

function beginsOf({line, actions}: Scenario, sampleS: number, setPointN: number): Begin[] {
  const commands = line.map(({atS, command}) => ({
    tick: tickOf(atS, sampleS),
    act: command,
    toN: null,
  }));
  const changes = actions.flatMap((action) =>
    'set' in action && action.set.setPointN !== undefined
      ? [{tick: tickOf(action.atS, sampleS), act: 'set point', toN: action.set.setPointN}]
      : [],
  );
  let targetN = setPointN;
  return [...commands, ...changes]
    .sort((a, b) => a.tick - b.tick)
    .map(({tick, act, toN}) => {
      const fromN = targetN;
      targetN = toN ?? targetN;
      return toN === null ? {tick, act, targetN} : {tick, act, targetN, stepFromN: fromN};
    });
}

function round(seconds: number): number {
  return Number(seconds.toFixed(6));
}
