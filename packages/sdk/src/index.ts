export * from './contract.js';
export { RillageError, describeIssue, type Issue } from './errors.js';
