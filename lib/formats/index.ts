export * from './kinds';
export { uploadLimits } from './limits';
