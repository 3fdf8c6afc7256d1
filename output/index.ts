export { type Measures, measure, type WallMeasures } from './measures/measures.ts';
