import { afterAll, describe, expect, it } from 'vitest';
import { galleryNames, galleryText, readCase } from '../../cases/index.ts';
import { Bench } from './swathe.ts';

const bench = new Bench();
afterAll(() => bench.remove());

describe('swathe gallery', () => {
  it('lists every ready-made case with its title', async () => {
    const { exit, out } = await bench.swathe('gallery');
    expect(exit).toBe(0);
    for (const name of galleryNames()) expect(out).toContain(readCase(galleryText(name), name).title);
  });

  it('prints one', async () => {
    const { out } = await bench.swathe('gallery', 'tilted-panel');
    expect(out).toBe(galleryText('tilted-panel'));
  });

  it('copies one, which can be checked and run as a file', async () => {
    const { exit, out } = await bench.swathe('gallery', 'tilted-panel', '--copy', 'mine');
    expect({ exit, out }).toEqual({ exit: 0, out: 'mine/tilted-panel.yaml\n' });
    expect(bench.read('mine/tilted-panel.yaml')).toBe(galleryText('tilted-panel'));
    expect((await bench.swathe('check', 'mine/tilted-panel.yaml')).exit).toBe(0);
  });

  it('copies all, and again over the same files', async () => {
    for (let time = 0; time < 2; time++) {
      const { exit, out } = await bench.swathe('gallery', '--copy', 'all');
      expect(exit).toBe(0);
      expect(out.trim().split('\n')).toHaveLength(galleryNames().length);
    }
  });

  it('keeps a file that was changed, copies nothing else, and says so', async () => {
    const [first, last] = [galleryNames()[0], galleryNames().at(-1)];
    await bench.swathe('gallery', `${last}`, '--copy', 'changed');
    bench.file(`changed/${last}.yaml`, 'title: changed\n');
    const { exit, error } = await bench.swathe('gallery', '--copy', 'changed');
    expect(exit).toBe(4);
    expect(error).toContain(`changed/${last}.yaml is there and differs`);
    expect(bench.read(`changed/${last}.yaml`)).toBe('title: changed\n');
    expect(() => bench.read(`changed/${first}.yaml`)).toThrow('ENOENT');
  });

  it('names the folder it cannot write', async () => {
    bench.file('plain.txt', '');
    const { exit, error } = await bench.swathe('gallery', '--copy', 'plain.txt/cases');
    expect(exit).toBe(4);
    expect(error).toContain('plain.txt/cases');
  });
});

describe('swathe schema', () => {
  it('prints a JSON Schema that knows the keys of a case', async () => {
    const { exit, out } = await bench.swathe('schema');
    expect(exit).toBe(0);
    const schema = JSON.parse(out);
    expect(schema.type).toBe('object');
    expect(Object.keys(schema.properties)).toEqual(
      expect.arrayContaining(['title', 'channel', 'liquid', 'gas', 'grid', 'record', 'swept']),
    );
  });

  it('writes it to a new file, never over one', async () => {
    expect((await bench.swathe('schema', '--out', 'case.schema.json')).exit).toBe(0);
    const written = bench.read('case.schema.json');
    expect(written).toBe((await bench.swathe('schema')).out);
    const { exit, error } = await bench.swathe('schema', '--out', 'case.schema.json');
    expect(exit).toBe(4);
    expect(error).toContain('case.schema.json is there; it was kept');
  });

  it('stops without an error when its reader has read enough', async () => {
    const { child, ended } = bench.start('schema');
    child.stdout?.destroy();
    const { exit, error } = await ended;
    expect(error).toBe('');
    expect(exit).toBe(0);
  });
});
