/** The wire between the two sides: one schema a request and response, and the types from them. */
export * from './common';
export * from './accounts';
export * from './benches';
export * from './run-summary';
export * from './judgement';
export * from './thresholds';
export * from './verdicts';
export * from './studies';
export * from './waiting';
export * from './ledger';
