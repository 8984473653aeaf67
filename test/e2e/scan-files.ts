/** Small scans as files of a folder, painted from the invented samples under names of their own. */
import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { demoFiles } from '../../src/demo/demo-samples.ts';

/** `NAME.current.tif` and `NAME.height.tif` that state unit, size and bias, as paths. */
export function scanPair(folder: string, name: string, side: number, like = 'quarry-07'): readonly string[] {
  mkdirSync(folder, { recursive: true });
  return demoFiles(like, side).filter((file) => file.name.endsWith('.tif')).map((file) => {
    const path = join(folder, file.name.replace(like, name));
    writeFileSync(path, file.bytes);
    return path;
  });
}

/** The same without a word on unit, size and bias: the text that states them is blanked. */
export function silentPair(folder: string, name: string, side: number): readonly string[] {
  mkdirSync(folder, { recursive: true });
  return demoFiles('quarry-07', side).filter((file) => file.name.endsWith('.tif')).map((file) => {
    const bytes = Buffer.from(file.bytes);
    const from = bytes.indexOf('{"evenglow"');
    bytes.fill(' ', from, bytes.indexOf('}', from) + 1);
    const path = join(folder, file.name.replace('quarry-07', name));
    writeFileSync(path, bytes);
    return path;
  });
}
