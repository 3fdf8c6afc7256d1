import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { PNG } from 'pngjs';

/** The last digit of a colour may differ between machines' arithmetic. */
const COLOUR_TOLERANCE = 2;

/**
 * Compares a picture with the stored one of that name. Where they differ, or none is stored, the picture is written beside it as
 * NAME-changed.png: look at it, and rename it if it is right.
 * @returns what differs, empty where nothing does
 */
export function differenceFromGolden(name: string, picture: Buffer): string {
  const stored = join(import.meta.dirname, 'golden', `${name}.png`);
  const changed = join(import.meta.dirname, 'golden', `${name}-changed.png`);
  const difference = existsSync(stored) ? compare(PNG.sync.read(readFileSync(stored)), PNG.sync.read(picture)) : 'nothing is stored yet';
  if (difference === '') rmSync(changed, { force: true });
  else writeFileSync(changed, picture);
  return difference === '' ? '' : `${difference}; see ${changed}`;
}

function compare(stored: PNG, picture: PNG): string {
  if (stored.width !== picture.width || stored.height !== picture.height) {
    return `stored ${stored.width} x ${stored.height}, now ${picture.width} x ${picture.height}`;
  }
  let different = 0;
  for (let i = 0; i < stored.data.length; i += 4) {
    for (let c = 0; c < 3; c++) {
      if (Math.abs(stored.data[i + c] - picture.data[i + c]) > COLOUR_TOLERANCE) {
        different++;
        break;
      }
    }
  }
  return different === 0 ? '' : `${different} of ${stored.width * stored.height} pixels differ`;
}
