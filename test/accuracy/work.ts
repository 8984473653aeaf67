/** The unit of work: paint or load one scene, have it appraised, score the answers. */
import { evaluate } from '../../src/evaluate/evaluate.ts';
import type { Sample } from '../../src/read/sample.ts';
import { createRecipe } from '../fixtures/create-sample.ts';
import { baselineAnswer } from './baseline.ts';
import { kindOf, sized } from './paint-kinds.ts';
import { paintScene } from './paint-scene.ts';
import type { Truth } from './paint-truth.ts';
import { answerOf } from './score-answer.ts';
import { scoreScene } from './score-scene.ts';
import type { SceneScore } from './score-scene.ts';
import { sharedScene } from './shared-scenes.ts';

/** Plain data. A shared scene is named by its file, a painted one by kind and seed; `share` paints a part of the map's sides. */
export type SceneTask =
  | { readonly kind: string; readonly seed: string; readonly share?: number; readonly baseline: boolean }
  | { readonly shared: string; readonly baseline: boolean };

export interface SceneResult {
  readonly name: string;
  readonly ours: SceneScore;
  readonly baseline?: SceneScore;
  readonly timeMs: number;
}

/** The device's bias is what a person would state; all else is the default. */
const changes = { stack: { biasV: 4 } };

export async function workOn(task: SceneTask): Promise<SceneResult> {
  const { sample, truth } = 'shared' in task ? await sharedScene(task.shared, changes) : paintScene(sized(kindOf(task.kind), task.share ?? 1), task.seed);
  const start = performance.now();
  const ours = oursOn(sample, truth);
  const timeMs = performance.now() - start;
  return { name: sample.name, ours, timeMs, ...(task.baseline ? { baseline: scoreScene(baselineAnswer(sample), truth) } : {}) };
}

function oursOn(sample: Sample, truth: Truth): SceneScore {
  return scoreScene(answerOf(evaluate(sample, createRecipe(changes))), truth);
}
