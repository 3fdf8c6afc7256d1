import { expect, it } from 'vitest';
import { answersOf } from '../../output/measures/answers.ts';
import { placesOf } from '../../output/measures/felt.ts';
import { makeRecording } from './recordings.ts';

it('all answers with their intervals take less than a second of a usual recording', () => {
  // 1000 samples of 500 elements, streaks of 40 samples that climb
  const shear = (_: string, s: number, e: number) => 0.3 + Math.sin((s - e) / 13) * Math.exp(-(((s - 2 * e + 4000) % 170) / 40));
  const recording = makeRecording({ elements: 500, samples: 1000, shear, swept: { above_Pa: 0.5, within_s: 1 } });
  answersOf(recording, placesOf(recording));
  const start = process.cpuUsage();
  answersOf(recording, placesOf(recording));
  const { user, system } = process.cpuUsage(start);
  // 0.4 s of CPU seen, 0.8 s the first time
  expect((user + system) / 1e6).toBeLessThan(1);
});
