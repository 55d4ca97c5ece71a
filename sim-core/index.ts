// The only door of the engine.
export * from './run/engine';
export * from './run/log';
export * from './run/replay';
export * from './run/run';
export * from './run/trace';
export {type Fault, ScenarioError} from './scenario/faults';
export * from './scenario/fields';
export {readAct, readDisturb, readLine, readSet} from './scenario/read-act';
export {readScenario, scenarioFaults, tickOf, withDefaults} from './scenario/read-scenario';
export * from './scenario/scenario';
export {type Settings, settingsOf} from './scenario/settings';
export * from './scoring/criteria';
