/** Values under a place of the map, asked for by a passing pointer, a click, or the keyboard's cross. */
import type { PointValues } from '../../workers/api.ts';
import { Latest } from './latest.ts';

interface PointQuestion {
  readonly id: string;
  readonly xUm: number;
  readonly yUm: number;
  readonly by: 'hover' | 'click' | 'cross';
}

export class StagePoints {
  /** Whether a pointer is over the map: what a passing one asked for is nothing once it has left. */
  isOver = false;
  private readonly asked: Latest<PointQuestion, PointValues>;

  constructor(ask: (id: string, xUm: number, yUm: number) => Promise<PointValues>, onValues: (values: PointValues, clicked: boolean) => void, onFailure: (error: unknown) => void) {
    this.asked = new Latest(({ id, xUm, yUm }) => ask(id, xUm, yUm), ({ by }, values) => {
      if (by !== 'hover' || this.isOver) onValues(values, by === 'click');
    }, (_, error) => { onFailure(error); });
  }

  ask(id: string, place: { readonly xUm: number; readonly yUm: number }, by: PointQuestion['by']): void {
    this.asked.ask({ id, ...place, by });
  }

  forget(): void {
    this.asked.forget();
  }
}
