export { clip } from '../machine';
export { areaHere, chanceBefore, setPaths, setSides } from './age-spread';
export { addLevelMeans, foldRows } from './level-means';
export { encodeRows, multiplyRows, pressRows } from './product';
export { openRows, setPhases, setTable } from './rows';
export { fillWeights, setKernel, setSingleAges } from './weights';
