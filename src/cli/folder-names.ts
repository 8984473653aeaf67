/** Folder names for samples: whatever a sample is called, its results stay inside the output folder on every system. */
import { Buffer } from 'node:buffer';

/** Bytes of UTF-8; file systems stop at 255, and a suffix and our own `.….partial` must still fit. */
const longestName = 200;
/** Names that Windows keeps for devices, with or without an extension. */
const deviceName = /^(con|prn|aux|nul|com[0-9¹²³]|lpt[0-9¹²³])(\..*)?$/i;
/** Files that stand beside the sample folders. */
const ownName = /^(tray\.(csv|html|jsonl)|compare\.(csv|html|json))$/i;

/**
 * One folder name per sample name, in the same order. Separators, control characters and characters that
 * some system forbids become `_`; leading and trailing dots and spaces, device names and our own file names
 * are avoided; long names are cut to 200 bytes. Names that would fall together, also where capitals
 * do not count, get `-2`, `-3` … in the order given.
 */
export function folderNames(samples: readonly string[]): string[] {
  const taken = new Set<string>();
  return samples.map((sample) => {
    const name = folderName(sample);
    let unique = name;
    for (let copy = 2; taken.has(unique.toLowerCase()); copy++) unique = `${name}-${copy}`;
    taken.add(unique.toLowerCase());
    return unique;
  });
}

/** The folder name of one sample that stands alone. */
export function folderName(sample: string): string {
  // Characters, not code units, so that none is cut in half; a lone surrogate would not survive as UTF-8.
  const letters = Array.from(sample.normalize('NFC').replace(/[<>:"/\\|?*\u0000-\u001f\u007f-\u009f\u200e\u200f\u202a-\u202e\u2066-\u2069]|\p{Surrogate}/gu, '_'));
  const cut = withinBytes(letters).replace(/^[. ]+|[. ]+$/g, (ends) => '_'.repeat(ends.length));
  if (cut === '') return '_';
  return deviceName.test(cut) || ownName.test(cut) ? `_${cut}` : cut;
}

function withinBytes(letters: readonly string[]): string {
  let bytes = 0;
  const end = letters.findIndex((letter) => (bytes += Buffer.byteLength(letter)) > longestName);
  return (end < 0 ? letters : letters.slice(0, end)).join('');
}
