export type { Case, Outline, WallSide } from './case.ts';
export type { BubbleRow, Checkpoint, History, Hooks, Progress, Recording, Snapshot, WallRows } from './recording.ts';
export type { Derived } from './scale.ts';
