// The door of the analysis: linear models of the stand and the arithmetic of loops. The engine never imports it.
export * from './alias';
export * from './forms';
export * from './linear/closed-loop';
export * from './linear/complex';
export * from './linear/exponential';
export * from './linear/process-models';
export * from './linear/sampled';
export * from './linear/span';
export * from './linear/state-space';
export * from './linear/step-response';
export * from './linear/unwind-plant';
export * from './second-order';
