export type { Case, WallSide } from './case.ts';
export { galleryNames, galleryText } from './gallery.ts';
export { readCase } from './read.ts';
export type { Checkpoint, History, Hooks, Progress, Recording, Snapshot } from './recording.ts';
export { type Derived, layOut } from './scale.ts';
export { caseSchema } from './schema.ts';
export { simulate } from './simulate.ts';
export { caseText } from './text.ts';
