export { type Measures, measure, type WallMeasures } from './measures/measures.ts';
export { drawFrame, type FrameStyle } from './pictures/frame.ts';
export { drawHistogram } from './pictures/histogram.ts';
export { drawShearMap, type ShearMapStyle } from './pictures/shearmap.ts';
