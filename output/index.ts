export type { FoundCheckpoint } from './folder/checkpoint.ts';
export { type Ending, RunFolder } from './folder/folder.ts';
export type { Beginning, RunRecord, RunStatus } from './folder/record.ts';
export { type Measures, measure, type WallMeasures } from './measures/measures.ts';
export { drawFrame, type FrameStyle } from './pictures/frame.ts';
export { drawHistogram } from './pictures/histogram.ts';
export { drawShearMap, type ShearMapStyle } from './pictures/shearmap.ts';
