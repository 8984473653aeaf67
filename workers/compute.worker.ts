/** The computation on a thread of its own. */
import { expose, releaseProxy, transfer } from 'comlink';
import { installKernels } from '../src/kernels/installed.ts';
import type { OnStage } from './api.ts';
import { createCompute } from './compute.ts';
import { asComputeError } from './errors.ts';
import type { Reply, WorkerApi } from './wire.ts';

const compute = createCompute();

// Not waited for: a message that came before `expose` would be lost. Until the kernels are there, and where they cannot be, the plain TypeScript computes the same.
WebAssembly.compileStreaming(fetch(new URL('../src/kernels/kernels.wasm', import.meta.url))).then(installKernels, () => undefined);

/** The answer to a call. What `moves` names is handed over instead of copied; the worker has no more use for it. */
async function answer<Value>(work: Promise<Value>, moves: (value: Value) => Transferable[] = () => []): Promise<Reply<Value>> {
  try {
    const value = await work;
    return transfer({ ok: true, value }, moves(value));
  } catch (error) {
    const { code, message, detail } = asComputeError(error);
    return { ok: false, code, message, detail };
  }
}

const buffer = ({ buffer }: { readonly buffer: ArrayBuffer }): Transferable[] => [buffer];

/** A listener on the page: what it answers is not waited for, and its channel is closed when the run has ended. */
interface RemoteListener {
  (...progress: Parameters<OnStage>): unknown;
  readonly [releaseProxy]?: () => void;
}

async function released<Value>(work: Promise<Value>, listener: RemoteListener | undefined): Promise<Value> {
  try {
    return await work;
  } finally {
    listener?.[releaseProxy]?.();
  }
}

const api: WorkerApi = {
  facts: () => answer(compute.facts()),
  group: (files) => answer(compute.group(files)),
  demos: () => answer(compute.demos()),
  adopt: (id, offer, recipe) => answer(compute.adopt(id, offer, recipe)),
  close: (id) => answer(compute.close(id)),
  appraise: (run, id, recipe, onStage?: RemoteListener) => answer(released(compute.appraise(run, id, recipe, onStage && ((progress) => void onStage(progress))), onStage)),
  abort: (run) => answer(compute.abort(run)),
  picture: (request) => answer(compute.picture(request), ({ rgba }) => buffer(rgba)),
  preview: (request) => answer(compute.preview(request), ({ picture }) => (picture ? buffer(picture.rgba) : [])),
  point: (id, xUm, yUm) => answer(compute.point(id, xUm, yUm)),
  cut: (request) => answer(compute.cut(request), buffer),
  histogram: (request) => answer(compute.histogram(request), buffer),
  resultNames: (id) => answer(compute.resultNames(id)),
  resultFile: (id, name) => answer(compute.resultFile(id, name), buffer),
};

expose(api);
