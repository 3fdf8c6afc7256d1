export { RunFolder } from './folder/folder.ts';
export type { Beginning, RunRecord } from './folder/record.ts';
export { type Measures, measure } from './measures/measures.ts';
export { drawFrame } from './pictures/frame.ts';
export { drawHistogram } from './pictures/histogram.ts';
export { drawShearMap } from './pictures/shearmap.ts';
export { readRefined } from './refine/answers.ts';
export { gridFolder, openRefinement, writeRefinement } from './refine/folder.ts';
export { type GridRun, type Refinement, refinement } from './refine/refinement.ts';
