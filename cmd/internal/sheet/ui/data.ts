// What the page is given, as cmd/internal/sheet/data.go lays it out.

export type XY = [number, number];

export interface Slip { from: XY; to: XY; centre?: XY; radius?: number; line?: XY[] }
export interface FreeWater { level: number; from: number; to: number }
export interface Water { line: number; head: number; invert: number; free: FreeWater[] }
export interface Answer { fs: string; method: string; slip: Slip | null; water: Water | null; ground: number }
export interface Placed { soil: number; outline: number; works: boolean }

export interface Post { x: number; top: number; bottom: number }
export interface Force { name: string; x: number; dx: number; dy: number }
export interface Load { name: string; from: number; to: number; start: number; end: number }
export interface Limit {
  kind: string; words: string; from: number; to: number; level: number; inward: number; dig: boolean; load: boolean; free: number;
}

export interface Design {
  ground: number;
  placed: Placed[];
  posts: Post[];
  answers: (Answer | null)[];
  governing: number;
  texts: Record<string, string>;
  cut: number;
  fill: number;
}

export interface Stop { design: number; state: string; status: string; note: string; marks: string }
export interface Option { designs: Design[]; stops: Stop[] }
export interface Target { short: string; long: string; required: string[]; answer: string; existing: string; least: number }
export interface Row { name: string; parent: number; stage: boolean }

export interface Data {
  view: { x0: number; x1: number; y0: number; y1: number };
  lines: XY[][];
  before: number;
  strata: { soil: number; top: number }[];
  soils: { name: string; tint: number }[];
  loads: Load[];
  forces: Force[];
  known: number[];
  limits: Limit[];
  length: number;
  rows: Row[];
  stops: Target[];
  specified: number;
  existing: Design;
  options: Option[];
}

// levelAt returns the level of a line at x; it is level beyond its ends.
export function levelAt(line: XY[], x: number): number {
  if (x < line[0][0]) return line[0][1];
  for (let i = line.length - 1; i >= 0; i--) {
    const p = line[i];
    if (p[0] > x) continue;
    const n = line[i + 1];
    if (!n || p[0] === x) return p[1];
    return p[1] + ((n[1] - p[1]) * (x - p[0])) / (n[0] - p[0]);
  }
  return line[0][1];
}

// answerOf returns the answer of a design in a row: the governing one for row -1, its situation's where a variant was not checked.
export function answerOf(data: Data, design: Design, row: number): Answer | null {
  if (row < 0) row = design.governing;
  if (row < 0) return null;
  const own = design.answers[row];
  const parent = data.rows[row].parent;
  return own ?? (parent >= 0 ? design.answers[parent] : null);
}
