// Labels of a figure: each takes the first of its places where it meets no label that stands, preferring one that covers no line.

export interface Box { x0: number; y0: number; x1: number; y1: number }
export interface Place { x: number; y: number; anchor: "start" | "middle" | "end" }

const family = "'Liberation Sans', Arial, Helvetica, sans-serif";
const pen = document.createElement("canvas").getContext("2d");

export function widthOf(text: string, size: number, bold: boolean): number {
  if (!pen) return text.length * size * 0.6;
  pen.font = `${bold ? "bold " : ""}${size}px ${family}`;
  return pen.measureText(text).width;
}

export class Labels {
  private boxes: Box[] = [];
  private marks: [number, number][] = []; // Points of lines that labels had better not cover.

  constructor(private room: Box) {}

  avoid(points: [number, number][]): void {
    for (let i = 0; i + 1 < points.length; i++) {
      const [a, b] = [points[i], points[i + 1]];
      const n = Math.max(1, Math.ceil(Math.hypot(b[0] - a[0], b[1] - a[1]) / 4));
      for (let k = 0; k <= n; k++) this.marks.push([a[0] + ((b[0] - a[0]) * k) / n, a[1] + ((b[1] - a[1]) * k) / n]);
    }
  }

  // place returns where a text of that size may stand; null if there is no room.
  place(text: string, size: number, bold: boolean, places: Place[]): Place | null {
    const width = widthOf(text, size, bold);
    let best: Place | null = null;
    let bestBox: Box | null = null;
    let least = Infinity;
    for (const p of places) {
      const left = p.anchor === "start" ? p.x : p.anchor === "end" ? p.x - width : p.x - width / 2;
      const box = { x0: left - 2, x1: left + width + 2, y0: p.y - size * 0.95, y1: p.y + size * 0.3 };
      if (box.x0 < this.room.x0 || box.x1 > this.room.x1 || box.y0 < this.room.y0 || box.y1 > this.room.y1) continue;
      if (this.boxes.some((b) => b.x0 < box.x1 && box.x0 < b.x1 && b.y0 < box.y1 && box.y0 < b.y1)) continue;
      const covered = this.marks.filter((m) => m[0] > box.x0 && m[0] < box.x1 && m[1] > box.y0 && m[1] < box.y1).length;
      if (covered < least) [best, bestBox, least] = [p, box, covered];
      if (covered === 0) break;
    }
    if (bestBox) this.boxes.push(bestBox);
    return best;
  }
}
