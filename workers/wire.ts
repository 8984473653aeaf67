/** What crosses between page and worker. */
import type { ComputeFacts, CutRequest, HistogramRequest, OnStage, Picture, PictureRequest, PointValues, Preview, PreviewRequest, RecipeData, SampleSummary, SourceFile } from './api.ts';
import { ComputeError } from './api.ts';
import type { Offers, SampleOffer } from './local-compute.ts';

/** An answer, or an error with its code and detail: a thrown error would keep only its message. */
export type Reply<Value> =
  | { readonly ok: true; readonly value: Value }
  | { readonly ok: false; readonly code: string; readonly message: string; readonly detail: unknown };

/** What a worker offers. Arguments stand side by side, because a callback inside an object does not cross. */
export interface WorkerApi {
  facts(): Promise<Reply<ComputeFacts>>;
  group(files: readonly SourceFile[]): Promise<Reply<Offers>>;
  demos(): Promise<Reply<Offers>>;
  adopt(id: string, offer: SampleOffer, recipe?: RecipeData): Promise<Reply<void>>;
  close(id: string): Promise<Reply<void>>;
  appraise(run: number, id: string, recipe: RecipeData, onStage?: OnStage): Promise<Reply<SampleSummary>>;
  abort(run: number): Promise<Reply<void>>;
  picture(request: PictureRequest): Promise<Reply<Picture>>;
  preview(request: PreviewRequest): Promise<Reply<Preview>>;
  point(id: string, xUm: number, yUm: number): Promise<Reply<PointValues>>;
  cut(request: CutRequest): Promise<Reply<Float32Array<ArrayBuffer>>>;
  histogram(request: HistogramRequest): Promise<Reply<Uint32Array<ArrayBuffer>>>;
  resultNames(id: string): Promise<Reply<readonly string[]>>;
  resultFile(id: string, name: string): Promise<Reply<Uint8Array<ArrayBuffer>>>;
}

/** The error that an answer carries. */
export function errorOf({ code, message, detail }: Extract<Reply<unknown>, { ok: false }>): ComputeError {
  return new ComputeError(code, message, detail);
}
