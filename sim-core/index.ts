// The only door of the engine.
export * from './run/log';
export * from './run/run';
export * from './run/trace';
export * from './scenario/scenario';
export * from './scoring/criteria';
