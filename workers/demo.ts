/** The invented samples as a source of files, so that they go through the same reader as everybody's. */
import { groupInputs, wantsContent } from '../src/read/pairing.ts';
import { Problem } from '../src/problems/problem.ts';
import type { Offers, SampleSource } from './local-compute.ts';

/** Names only; painting waits until a sample is appraised, and the painter is loaded when it is first needed. */
export async function demoOffers(): Promise<Offers> {
  const { demoSamples } = await import('../src/demo/demo-samples.ts');
  return {
    samples: demoSamples.map(({ name, files }) => ({ name, files, source: { kind: 'demo', name } })),
    skipped: [], failed: [],
  };
}

/** Paints one. */
export async function demoSource(name: string): Promise<Extract<SampleSource, { kind: 'files' }>> {
  const { demoFiles } = await import('../src/demo/demo-samples.ts');
  const files = demoFiles(name);
  const grouping = groupInputs(files.map((file) => (wantsContent(file.name) ? file : { name: file.name })));
  const group = grouping.samples[0];
  if (!group || grouping.samples.length > 1) throw new Problem('sample-no-map', { sample: name });
  // The painter makes the arrays for us alone, so the buffer is an ordinary one.
  return { kind: 'files', group, files: files.map((file) => ({ name: file.name, content: file.bytes as Uint8Array<ArrayBuffer> })) };
}
