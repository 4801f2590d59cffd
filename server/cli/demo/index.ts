// The demonstration's invented logs: pure functions of a seed, no database and no clock.
export { DEMO, demoLogs } from './demo-logs';
export type { DemoLog } from './demo-logs';
export { SAMPLE, sampleLogs } from './sample-logs';
