/** Circles in the import graph. */
import type { Graph } from './graph.ts';

/** Each circle once, as the paths along it; type imports count. */
export function cyclesOf(graph: Graph): readonly (readonly string[])[] {
  const done = new Set<string>();
  const cycles: string[][] = [];
  for (const start of graph.keys()) walk(start, []);
  return cycles;

  function walk(path: string, way: readonly string[]): void {
    const seenAt = way.indexOf(path);
    if (seenAt >= 0) {
      cycles.push([...way.slice(seenAt), path]);
      return;
    }
    const source = graph.get(path);
    if (!source || done.has(path)) return;
    for (const link of source.links) if (!link.outside) walk(link.to, [...way, path]);
    done.add(path);
  }
}
