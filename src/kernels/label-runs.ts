import { withKernels } from './installed.ts';

/** Fewer pixels than this are filled one by one. */
const shortRun = 24;

/** As `labelComponents` of grid/, by runs; undefined where no kernel can. The mask must be columns × rows. */
export function labelRuns(mask: Uint8Array, columns: number, rows: number, connectivity: 4 | 8): { labels: Uint32Array; count: number; pixels: Uint32Array } | undefined {
  const room = 4 * (rows * Math.ceil(columns / 2) + 1);
  return withKernels([mask.length, room, room, room, room], (kernels, [at, startsAt, endsAt, numbersAt, pixelsAt]) => {
    const { buffer } = kernels.memory;
    new Uint8Array(buffer, at, mask.length).set(mask);
    const runs = kernels.findRuns(at!, columns, rows, connectivity === 8 ? 1 : 0, startsAt!, endsAt!, numbersAt!);
    const count = kernels.numberRuns(startsAt!, endsAt!, numbersAt!, runs, pixelsAt!);

    // Filled here rather than copied: most maps hold few runs, and untouched parts of a new array cost nothing.
    const labels = new Uint32Array(mask.length);
    const starts = new Uint32Array(buffer, startsAt, runs);
    const ends = new Uint32Array(buffer, endsAt, runs);
    const numbers = new Uint32Array(buffer, numbersAt, runs);
    for (let run = 0; run < runs; run++) {
      const start = starts[run]!;
      const end = ends[run]!;
      const number = numbers[run]!;
      if (end - start < shortRun) for (let k = start; k < end; k++) labels[k] = number;
      else labels.fill(number, start, end);
    }
    const pixels = new Uint32Array(buffer, pixelsAt, count + 1).slice();
    pixels[0] = mask.length;
    for (let number = 1; number <= count; number++) pixels[0]! -= pixels[number]!;
    return { labels, count, pixels };
  });
}
