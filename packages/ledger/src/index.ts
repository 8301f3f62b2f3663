export * from './answers.js';
export * from './conversions.js';
export * from './costs.js';
export * from './leg.js';
export * from './memos.js';
export * from './moves.js';
export * from './reckon.js';
export * from './taking-in.js';
