// A section drawn to equal scales at the width of its element.

import { answerOf, levelAt, type Answer, type Data, type Design, type Limit, type Water, type XY } from "./data";
import { Labels, widthOf, type Place } from "./labels";

const svgSpace = "http://www.w3.org/2000/svg";
const textSize = 11;
const margin = { left: 34, right: 8, top: 18, bottom: 20 };

// What a figure shows besides its design.
export interface Shown {
  row: number; // Of the check; -1: the governing one.
  ghost: Design | null; // The works as specified, where others are drawn.
  named: boolean; // Soils, water and surcharges are named.
}

function make(parent: Element, name: string, attributes: Record<string, string | number> = {}): SVGElement {
  const e = document.createElementNS(svgSpace, name);
  for (const key of Object.keys(attributes)) e.setAttribute(key, String(attributes[key]));
  parent.append(e);
  return e;
}

const cm = (v: number) => v.toFixed(2);

export class Figure {
  private svg: SVGElement;
  private cross: SVGElement | null = null;
  private width = 0;
  private height = 0;
  private scale = 1;
  private design: Design;
  private answer: Answer | null = null;
  private at: number | null = null; // Offset being read off, m.

  constructor(private data: Data, readonly host: HTMLElement, private readout: HTMLElement, private id: string, private hint: string) {
    this.design = data.existing;
    this.svg = make(host, "svg", { "aria-hidden": "true", focusable: "false" });
    readout.textContent = this.hint;
    this.listen();
  }

  // fit sets the width that the figure is laid out for, px.
  fit(width: number): void {
    const v = this.data.view;
    this.width = Math.max(240, Math.round(width));
    this.scale = (this.width - margin.left - margin.right) / (v.x1 - v.x0);
    this.height = Math.round((v.y1 - v.y0) * this.scale + margin.top + margin.bottom);
    this.svg.setAttribute("viewBox", `0 0 ${this.width} ${this.height}`);
    this.svg.setAttribute("width", String(this.width));
    this.svg.setAttribute("height", String(this.height));
  }

  private x(v: number): number {
    return margin.left + (v - this.data.view.x0) * this.scale;
  }

  private y(v: number): number {
    return margin.top + (this.data.view.y1 - v) * this.scale;
  }

  private px(p: XY): XY {
    return [this.x(p[0]), this.y(p[1])];
  }

  // pixels returns a line on the page from edge to edge of the view, level beyond its ends.
  private pixels(line: XY[]): XY[] {
    const { x0, x1 } = this.data.view;
    const inner = line.filter((p) => p[0] > x0 && p[0] < x1);
    return [[x0, levelAt(line, x0)] as XY, ...inner, [x1, levelAt(line, x1)] as XY].map((p) => this.px(p));
  }

  private path(points: XY[]): string {
    return points.map((p, i) => `${i ? "L" : "M"}${cm(p[0])} ${cm(p[1])}`).join("");
  }

  // under returns the area below a line down to the foot of the view, over the area above it up to the top.
  private under(line: XY[]): string {
    const p = this.pixels(line);
    const foot = this.y(this.data.view.y0);
    return `${this.path(p)}L${cm(p[p.length - 1][0])} ${cm(foot)}L${cm(p[0][0])} ${cm(foot)}Z`;
  }

  private over(line: XY[]): string {
    const p = this.pixels(line);
    return `${this.path(p)}L${cm(p[p.length - 1][0])} ${margin.top}L${cm(p[0][0])} ${margin.top}Z`;
  }

  draw(design: Design, shown: Shown): void {
    this.design = design;
    this.answer = answerOf(this.data, design, shown.row);
    const was = answerOf(this.data, this.data.existing, shown.row < 0 ? design.governing : shown.row);
    this.svg.replaceChildren();
    const labels = new Labels({ x0: margin.left + 1, y0: margin.top, x1: this.width - margin.right - 1, y1: this.height - margin.bottom });
    this.defs(design);
    this.ground(design);
    if (this.answer?.water) this.waters(this.answer.water, was?.water ?? null);
    this.outlines(design, shown.ghost);
    this.posts(design);
    this.slip(this.answer);
    this.loads(design, shown.named ? labels : null);
    this.limits(labels);
    this.axes();
    this.name(design, shown, labels);
    this.cross = make(this.svg, "g", { class: "cross" });
    this.mark();
  }

  private line(index: number): XY[] {
    return this.data.lines[index];
  }

  private defs(design: Design): void {
    const defs = make(this.svg, "defs");
    const clip = (name: string, d: string) => make(make(defs, "clipPath", { id: `${this.id}-${name}` }), "path", { d });
    clip("under-after", this.under(this.line(design.ground)));
    clip("over-after", this.over(this.line(design.ground)));
    clip("under-before", this.under(this.line(this.data.before)));
    clip("over-before", this.over(this.line(this.data.before)));
    const v = this.data.view;
    make(make(defs, "clipPath", { id: `${this.id}-all` }), "rect", {
      x: margin.left, y: margin.top, width: cm((v.x1 - v.x0) * this.scale), height: cm((v.y1 - v.y0) * this.scale),
    });
    for (const [name, turn, wide] of [["cut", -45, 6], ["fill", 45, 6], ["zone", 0, 4]] as const) {
      const p = make(defs, "pattern", {
        id: `${this.id}-${name}`, width: 6, height: wide, patternUnits: "userSpaceOnUse", patternTransform: `rotate(${turn})`,
      });
      make(p, "path", { d: "M-1 3H7", class: `hatch-${name}` });
    }
  }

  private clipped(name: string, parent: Element = this.svg): SVGElement {
    return make(parent, "g", { "clip-path": `url(#${this.id}-${name})` });
  }

  private ground(design: Design): void {
    make(this.clipped("all"), "path", { d: this.under([[this.data.view.x0, this.data.view.y1]]), class: "air" });
    const soils = this.clipped("under-before", this.clipped("under-after"));
    for (const s of this.data.strata) {
      make(soils, "path", { d: this.under(this.line(s.top)), class: `soil tint${this.data.soils[s.soil].tint}` });
    }
    make(this.clipped("over-after"), "path", { d: this.under(this.line(this.data.before)), class: "cut", fill: `url(#${this.id}-cut)` });
    const fills = this.clipped("under-after");
    make(this.clipped("over-before", fills), "path", { d: this.under(this.line(design.ground)), class: "added" });
    for (const p of design.placed) {
      const d = this.path(this.line(p.outline).map((q) => this.px(q))) + "Z";
      make(fills, "path", { d, class: `body tint${this.data.soils[p.soil].tint}` });
      if (p.works) make(fills, "path", { d, class: "fill", fill: `url(#${this.id}-fill)` });
    }
  }

  private waters(water: Water, was: Water | null): void {
    const g = make(this.clipped("all"), "g", { class: "water-layer" });
    for (const f of water.free) {
      const wet = make(this.clipped("over-after", g), "path", {
        d: `M${cm(this.x(f.from))} ${cm(this.y(f.level))}H${cm(this.x(f.to))}V${cm(this.y(this.data.view.y0))}H${cm(this.x(f.from))}Z`,
      });
      wet.setAttribute("class", "free");
    }
    const stroke = (index: number, name: string) => {
      if (index >= 0) make(g, "path", { d: this.path(this.line(index).map((p) => this.px(p))), class: name });
    };
    if (was && was.line !== water.line && was.line >= 0) make(g, "path", { d: this.path(this.pixels(this.line(was.line))), class: "water-was" });
    if (water.line >= 0) make(g, "path", { d: this.path(this.pixels(this.line(water.line))), class: "water" });
    stroke(water.head, "head");
    stroke(water.invert, "invert");
  }

  private outlines(design: Design, ghost: Design | null): void {
    const g = this.clipped("all");
    if (design.ground !== this.data.before) make(g, "path", { d: this.path(this.pixels(this.line(this.data.before))), class: "before" });
    make(g, "path", { d: this.path(this.pixels(this.line(design.ground))), class: "after" });
    if (this.answer && this.answer.ground >= 0) make(g, "path", { d: this.path(this.pixels(this.line(this.answer.ground))), class: "stage" });
    if (ghost && ghost.ground !== design.ground) make(g, "path", { d: this.path(this.pixels(this.line(ghost.ground))), class: "ghost" });
  }

  private posts(design: Design): void {
    for (const p of design.posts) make(this.clipped("all"), "path", { d: `M${cm(this.x(p.x))} ${cm(this.y(p.top))}V${cm(this.y(p.bottom))}`, class: "post" });
  }

  private slip(answer: Answer | null): void {
    const g = make(this.clipped("all"), "g", { class: "slip-layer" });
    for (const k of this.data.known) make(g, "path", { d: this.path(this.line(k).map((p) => this.px(p))), class: "known" });
    const s = answer?.slip;
    if (!s) return;
    make(g, "path", { d: this.path(this.slipPixels(answer)), class: "slip" });
  }

  // slipPixels returns points of a slip from its left end to its right.
  private slipPixels(answer: Answer): XY[] {
    const s = answer.slip;
    if (!s) return [];
    if (!s.centre || !s.radius) return (s.line ?? []).map((p) => this.px(p));
    const angle = (p: XY) => Math.atan2(p[1] - s.centre![1], p[0] - s.centre![0]);
    let from = angle(s.from);
    const to = angle(s.to);
    if (from > 0) from -= 2 * Math.PI; // The left end lies above the centre: count through the lower arc.
    const pieces = 64;
    const out: XY[] = [this.px(s.from)];
    for (let i = 1; i < pieces; i++) {
      const a = from + ((to - from) * i) / pieces;
      out.push(this.px([s.centre[0] + s.radius * Math.cos(a), s.centre[1] + s.radius * Math.sin(a)]));
    }
    out.push(this.px(s.to));
    return out;
  }

  private loads(design: Design, labels: Labels | null): void {
    const v = this.data.view;
    const ground = this.line(design.ground);
    for (const f of this.data.forces) this.force(ground, f.x, f.dx, f.dy, labels);
    for (const l of this.data.loads) {
      const from = Math.max(l.from, v.x0);
      const to = Math.min(l.to, v.x1);
      const least = 14; // Pixels: less of it would not be known for what it is.
      if ((to - from) * this.scale < least) continue;
      const n = Math.max(2, Math.round(((to - from) * this.scale) / 14));
      let d = "";
      const top: XY[] = [];
      for (let i = 0; i <= n; i++) {
        const at = from + ((to - from) * i) / n;
        const [x, y] = this.px([at, levelAt(ground, at)]);
        const high = 2 + 11 * (l.start + ((l.end - l.start) * (at - l.from)) / (l.to - l.from));
        top.push([x, y - high]);
        if (high > 7) d += `M${cm(x)} ${cm(y - high)}V${cm(y - 2)}m-2 -4l2 4l2 -4`;
      }
      make(this.svg, "path", { d: d + this.path(top), class: "load" });
      if (!labels) continue;
      labels.avoid(top);
      const [x, y] = top[Math.floor(n / 2)];
      this.write(labels, l.name, "load-name", false, [
        { x, y: y - 4, anchor: "middle" }, { x: top[0][0] - 6, y: y + 6, anchor: "end" }, { x: top[n][0] + 6, y: y + 2, anchor: "start" },
      ]);
    }
  }

  // force draws a line load: an arrow in its direction, with its tip on the ground or, where it pulls, its tail.
  private force(ground: XY[], at: number, dx: number, dy: number, labels: Labels | null): void {
    if (at < this.data.view.x0 || at > this.data.view.x1) return;
    const long = 20;
    const [x, y] = this.px([at, levelAt(ground, at)]);
    const [tx, ty] = dy < 0 ? [x + dx * long, y + dy * long] : [x, y - 2];
    labels?.avoid([[tx - dx * long, ty - dy * long], [tx, ty]]);
    const side = (turn: number) => {
      const [c, s] = [Math.cos(turn), Math.sin(turn)];
      return `M${cm(tx)} ${cm(ty)}l${cm(-5 * (dx * c - dy * s))} ${cm(-5 * (dx * s + dy * c))}`;
    };
    make(this.svg, "path", { d: `M${cm(tx - dx * long)} ${cm(ty - dy * long)}L${cm(tx)} ${cm(ty)}${side(0.45)}${side(-0.45)}`, class: "force" });
  }

  // limits draws what the works must keep to. Labels keep off the lines.
  private limits(labels: Labels): void {
    const g = make(this.clipped("all"), "g", { class: "limit-layer" });
    const ground = this.line(this.data.before);
    for (const l of this.data.limits) {
      if (l.kind === "fence") this.fence(g, ground, l, labels);
      else if (l.kind === "zone") this.zone(g, ground, l, labels);
      else {
        const line = [this.px([l.from, l.level]), this.px([l.to, l.level])];
        make(g, "path", { d: this.path(line), class: l.kind });
        labels.avoid(line);
      }
    }
  }

  private fence(g: Element, ground: XY[], l: Limit, labels: Labels): void {
    const [x, y] = this.px([l.from, levelAt(ground, l.from)]);
    const top = y - 26;
    make(g, "path", { d: `M${cm(x)} ${cm(top)}V${cm(y + 10)}`, class: "fence" });
    make(g, "path", { d: `M${cm(x)} ${cm(top + 3)}h${9 * l.inward}m${-4 * l.inward} -2.5l${4 * l.inward} 2.5l${-4 * l.inward} 2.5`, class: "inward" });
    labels.avoid([[x, top], [x, y + 10]]);
  }

  private zone(g: Element, ground: XY[], l: Limit, labels: Labels): void {
    const inner = ground.filter((p) => p[0] > l.from && p[0] < l.to).map((p) => p[0]);
    const along = [l.from, ...inner, l.to].map((x) => this.px([x, levelAt(ground, x)]));
    const free = l.free * this.scale;
    const up = l.load ? -9 : l.dig ? free : 0;
    const down = l.dig ? 14 + free : 0;
    const ring = [...along.map(([x, y]) => [x, y + up] as XY), ...along.reverse().map(([x, y]) => [x, y + down] as XY)];
    make(g, "path", { d: this.path(ring) + "Z", class: "zone", fill: `url(#${this.id}-zone)` });
    labels.avoid([...ring, ring[0]]);
  }

  private axes(): void {
    const v = this.data.view;
    const g = make(this.svg, "g", { class: "axes" });
    const bottom = this.height - margin.bottom;
    make(g, "path", { d: `M${margin.left} ${margin.top}V${cm(bottom)}H${this.width - margin.right}`, class: "frame" });
    const step = (span: number, least: number) => [1, 2, 5, 10, 20, 50, 100, 200, 500].find((s) => s * this.scale >= least) ?? span;
    const sx = step(v.x1 - v.x0, 34);
    const unit = "offset, m";
    const unitFrom = this.width - margin.right - widthOf(unit, textSize, false);
    for (let x = Math.ceil(v.x0 / sx) * sx; x <= v.x1; x += sx) {
      make(g, "path", { d: `M${cm(this.x(x))} ${cm(bottom)}v4`, class: "tick" });
      const half = widthOf(String(x), textSize, false) / 2;
      if (this.x(x) + half < unitFrom - 6 && this.x(x) - half > 0) this.text(g, String(x), this.x(x), bottom + 15, "middle");
    }
    this.text(g, unit, this.width - margin.right, bottom + 15, "end");
    this.text(g, "level, m", 2, 11, "start");
    const sy = step(v.y1 - v.y0, 20);
    for (let y = Math.ceil(v.y0 / sy) * sy; y <= v.y1; y += sy) {
      make(g, "path", { d: `M${margin.left} ${cm(this.y(y))}h-4`, class: "tick" });
      if (this.y(y) > margin.top + 3 && this.y(y) < bottom - 3) this.text(g, String(y), margin.left - 6, this.y(y) + 4, "end");
    }
  }

  private text(parent: Element, text: string, x: number, y: number, anchor: string, name = ""): SVGElement {
    const e = make(parent, "text", { x: cm(x), y: cm(y), "text-anchor": anchor });
    if (name) e.setAttribute("class", name);
    e.textContent = text;
    return e;
  }

  private write(labels: Labels, text: string, name: string, bold: boolean, places: Place[], size = textSize): void {
    const p = labels.place(text, size, bold, places);
    if (p) this.text(this.svg, text, p.x, p.y, p.anchor, `label ${name}`);
  }

  // name places the labels inside the section.
  private name(design: Design, shown: Shown, labels: Labels): void {
    const after = this.pixels(this.line(design.ground));
    labels.avoid(after);
    labels.avoid(this.pixels(this.line(this.data.before)));
    const water = this.answer?.water;
    if (water && water.line >= 0) labels.avoid(this.pixels(this.line(water.line)));
    if (this.answer?.slip) {
      const s = this.slipPixels(this.answer);
      labels.avoid(s);
      const places: Place[] = [];
      for (const share of [0.5, 0.4, 0.6, 0.3, 0.7, 0.2, 0.8]) {
        const [x, y] = s[Math.round(share * (s.length - 1))];
        places.push({ x, y: y + 16, anchor: "middle" }, { x, y: y - 7, anchor: "middle" });
      }
      this.write(labels, `FS ${this.answer.fs}`, "fs-name slip-layer", true, places, 12);
    }
    if (!shown.named) return;
    if (water && water.line >= 0) {
      const line = this.line(water.line);
      const row = shown.row < 0 ? design.governing : shown.row;
      const places: Place[] = [];
      for (const share of [0.06, 0.12, 0.9, 0.2, 0.3, 0.8, 0.4]) {
        const at = this.data.view.x0 + share * (this.data.view.x1 - this.data.view.x0);
        const [x, y] = this.px([at, levelAt(line, at)]);
        places.push({ x, y: y - 5, anchor: "middle" }, { x, y: y + 14, anchor: "middle" });
      }
      this.write(labels, row >= 0 ? this.data.rows[row].name : "water", "water-name water-layer", false, places);
    }
    this.soils(design, labels);
    this.limitNames(labels);
  }

  private limitNames(labels: Labels): void {
    const ground = this.line(this.data.before);
    for (const l of this.data.limits.filter((v) => v.words)) {
      const middle = (Math.max(l.from, this.data.view.x0) + Math.min(l.to, this.data.view.x1)) / 2;
      const [x, y] = this.px([middle, l.kind === "fence" || l.kind === "zone" ? levelAt(ground, middle) : l.level]);
      const places: Place[] = l.kind === "fence"
        ? [{ x, y: y - 30, anchor: "middle" }, { x: x - 5, y: y - 18, anchor: "end" }, { x: x + 5, y: y - 18, anchor: "start" }]
        : l.kind === "zone"
          ? [{ x, y: y + 28, anchor: "middle" }, { x, y: y - 14, anchor: "middle" }, { x: this.x(l.to) + 5, y: y + 12, anchor: "start" }, { x, y: y + 42, anchor: "middle" }]
          : [{ x, y: y - 5, anchor: "middle" }, { x, y: y + 14, anchor: "middle" }, { x, y: y - 18, anchor: "middle" }];
      this.write(labels, l.words, "limit-name limit-layer", false, places);
    }
  }

  private soils(design: Design, labels: Labels): void {
    const v = this.data.view;
    for (const [i, s] of this.data.strata.entries()) {
      const places: (Place & { thick: number })[] = [];
      for (let share = 0.04; share < 0.98; share += 0.04) {
        const x = v.x0 + share * (v.x1 - v.x0);
        const top = Math.min(levelAt(this.line(s.top), x), levelAt(this.line(design.ground), x), levelAt(this.line(this.data.before), x));
        const below = this.data.strata.slice(i + 1).map((t) => levelAt(this.line(t.top), x));
        const foot = Math.max(v.y0, ...below);
        const thick = (top - foot) * this.scale;
        if (thick > textSize + 3) places.push({ x: this.x(x), y: this.y((top + foot) / 2) + textSize * 0.35, anchor: "middle", thick });
      }
      places.sort((a, b) => Math.round(b.thick / 8) - Math.round(a.thick / 8));
      this.write(labels, this.data.soils[s.soil].name, "soil-name", false, places);
    }
    for (const p of design.placed.filter((b) => b.works)) {
      const o = this.line(p.outline).map((q) => this.px(q));
      const x = (Math.min(...o.map((q) => q[0])) + Math.max(...o.map((q) => q[0]))) / 2;
      const y = Math.min(...o.map((q) => q[1])) - 6;
      this.write(labels, this.data.soils[p.soil].name, "soil-name", false, [
        { x, y, anchor: "middle" }, { x: x + 14, y: y - 12, anchor: "start" }, { x, y: y - 26, anchor: "middle" },
      ]);
    }
  }

  // Reading off.

  private listen(): void {
    const h = this.host;
    h.addEventListener("pointermove", (e) => this.point(e));
    h.addEventListener("pointerdown", (e) => this.point(e));
    h.addEventListener("pointerleave", () => {
      if (document.activeElement !== h) this.read(null);
    });
    h.addEventListener("focus", () => this.read(this.at ?? this.middle()));
    h.addEventListener("blur", () => this.read(null));
    h.addEventListener("keydown", (e) => this.key(e));
  }

  private middle(): number {
    const v = this.data.view;
    return Math.round((v.x0 + v.x1) / 2);
  }

  private point(e: PointerEvent): void {
    const box = this.svg.getBoundingClientRect();
    const x = this.data.view.x0 + (((e.clientX - box.left) / box.width) * this.width - margin.left) / this.scale;
    const y = this.data.view.y1 - (((e.clientY - box.top) / box.height) * this.height - margin.top) / this.scale;
    this.read(x, y);
  }

  private key(e: KeyboardEvent): void {
    const v = this.data.view;
    const step = e.shiftKey ? 5 : 0.5;
    const at = this.at ?? this.middle();
    const to: Record<string, number | null> = {
      ArrowRight: at + step, ArrowUp: at + step, ArrowLeft: at - step, ArrowDown: at - step,
      PageUp: at + 5, PageDown: at - 5, Home: v.x0, End: v.x1, Escape: null,
    };
    if (!(e.key in to)) return;
    e.preventDefault();
    const x = to[e.key];
    this.read(x === null ? null : e.key === "Home" || e.key === "End" ? x : Math.round(x * 2) / 2);
  }

  // read shows the levels at an offset, with the level pointed at if there is one.
  private read(x: number | null, y?: number): void {
    const v = this.data.view;
    this.at = x === null ? null : Math.min(v.x1, Math.max(v.x0, x));
    this.mark();
    if (this.at === null) {
      this.readout.textContent = this.hint;
      return;
    }
    const text = this.levels(this.at, y);
    this.readout.textContent = text;
    this.host.setAttribute("aria-valuemin", v.x0.toFixed(2));
    this.host.setAttribute("aria-valuemax", v.x1.toFixed(2));
    this.host.setAttribute("aria-valuenow", this.at.toFixed(2));
    this.host.setAttribute("aria-valuetext", text);
  }

  private levels(x: number, y?: number): string {
    const parts = [`offset ${x.toFixed(2)}`];
    if (y !== undefined) parts.push(`level ${y.toFixed(2)}`);
    const before = levelAt(this.line(this.data.before), x);
    const after = levelAt(this.line(this.design.ground), x);
    if (Math.abs(before - after) < 0.005) parts.push(`ground ${after.toFixed(2)}`);
    else parts.push(`before ${before.toFixed(2)}`, `after ${after.toFixed(2)}`);
    const water = this.answer?.water;
    if (water && water.line >= 0) parts.push(`water ${levelAt(this.line(water.line), x).toFixed(2)}`);
    const near = this.data.limits.filter((l) => l.words && l.kind !== "fence" && x >= l.from && x <= l.to).map((l) => `; ${l.words}`);
    return parts.join(", ") + " m" + near.join("");
  }

  private mark(): void {
    if (!this.cross) return;
    this.cross.replaceChildren();
    if (this.at === null) return;
    const x = this.x(this.at);
    make(this.cross, "path", { d: `M${cm(x)} ${margin.top}V${cm(this.height - margin.bottom)}`, class: "hair" });
    make(this.cross, "circle", { cx: cm(x), cy: cm(this.y(levelAt(this.line(this.design.ground), this.at))), r: 3.5, class: "dot" });
  }
}
