/** The grid of a painted scene. Lengths are nanometres, x from the left, y from the top: scenes are made in nm and sampled afterwards. */
export interface PaintGrid {
  readonly columns: number;
  readonly rows: number;
  readonly widthNm: number;
  readonly heightNm: number;
}

export function pitchXNm(grid: PaintGrid): number {
  return grid.widthNm / grid.columns;
}

export function pitchYNm(grid: PaintGrid): number {
  return grid.heightNm / grid.rows;
}

/** Calls `visit` for every pixel whose centre lies in a rectangle; the part of it that is off the map is left out. */
export function visitBox(grid: PaintGrid, box: { readonly fromX: number; readonly toX: number; readonly fromY: number; readonly toY: number }, visit: (index: number, xNm: number, yNm: number) => void): void {
  const [px, py] = [pitchXNm(grid), pitchYNm(grid)];
  const first = (from: number, pitch: number): number => Math.max(0, Math.ceil(from / pitch - 0.5));
  const last = (to: number, pitch: number, count: number): number => Math.min(count - 1, Math.floor(to / pitch - 0.5));
  const toC = last(box.toX, px, grid.columns);
  const toR = last(box.toY, py, grid.rows);
  for (let r = first(box.fromY, py); r <= toR; r++) {
    for (let c = first(box.fromX, px); c <= toC; c++) visit(r * grid.columns + c, (c + 0.5) * px, (r + 0.5) * py);
  }
}
