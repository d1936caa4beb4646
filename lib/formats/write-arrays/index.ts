export { fitsOfMaps } from './fits';
export { hdf5OfMaps } from './hdf5';
export { jsonOfMap } from './json';
export { npyOfMaps, npyOfNumbers } from './npy';
export { npzOfMaps } from './npz';
export {
  bytesOf,
  collectBytes,
  type FloatFormat,
  type WrittenBytes,
  type WrittenMaps,
} from './written-maps';
