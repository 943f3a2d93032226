export * from './errors.js';
export * from './source/sample-source.js';
export * from './record/record.js';
export * from './record/warning.js';
export * from './measures/measure.js';
export * from './stimulus/descriptor.js';
export * from './random/create-random.js';
export * from './record/make-warning.js';
