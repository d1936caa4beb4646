/** What answers a moved control: of use only with the maps, and so fetched beside them. */
export { liveAnswer } from './live-answer';
export { sampleUnder } from './live-stacks';
export { LiveViews } from './live-views';
export { rehearseDrag } from './rehearsal';
