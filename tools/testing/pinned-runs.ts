// The runs whose fingerprints are pinned, for tests outside the engine that run them elsewhere.
export {BYTES} from '#sim-core/run/hashes';
export {LIVELY, live as liveLog} from '#sim-core/test-support/a-live-log';
