// What the browser tests look at in a page.
window.look = {
  // texts returns every text that is shown: its words, box, colour and what it stands on.
  texts() {
    const out = [];
    const walker = document.createTreeWalker(document.body, NodeFilter.SHOW_TEXT);
    for (let n = walker.nextNode(); n; n = walker.nextNode()) {
      const e = n.parentElement;
      if (!n.textContent.trim() || e.closest("script, style, noscript, option, .sr, .skip")) continue;
      if (!e.checkVisibility({ visibilityProperty: true, opacityProperty: true })) continue;
      const range = document.createRange();
      range.selectNodeContents(n);
      const rects = e instanceof SVGElement ? [e.getBoundingClientRect()] : [...range.getClientRects()];
      for (const r of rects) if (r.width > 0.5 && r.height > 0.5) out.push({ text: n.textContent.trim().slice(0, 60), e, r });
    }
    return out;
  },
  // overlaps lists pairs of texts that stand on each other.
  overlaps() {
    const t = this.texts(), out = [], slack = 1.2;
    t.sort((a, b) => a.r.top - b.r.top);
    for (let i = 0; i < t.length; i++) {
      for (let k = i + 1; k < t.length && t[k].r.top < t[i].r.bottom - slack; k++) {
        const a = t[i].r, b = t[k].r;
        if (a.left < b.right - slack && b.left < a.right - slack) out.push(`${t[i].text} / ${t[k].text}`);
      }
    }
    return out;
  },
  // clipped lists texts that leave the page or the box that cuts them off; what scrolls may.
  clipped() {
    const wide = document.documentElement.clientWidth, out = [];
    for (const { text, e, r } of this.texts()) {
      if (e.closest(".scroll") && getComputedStyle(e.closest(".scroll")).overflowX === "auto") continue;
      const svg = e.closest("svg");
      const room = svg ? svg.getBoundingClientRect() : { left: 0, right: wide, top: -Infinity, bottom: Infinity };
      if (r.left < room.left - 1 || r.right > room.right + 1 || r.top < room.top - 1 || r.bottom > room.bottom + 1) out.push(text);
    }
    if (document.documentElement.scrollWidth > wide) out.push(`the page is ${document.documentElement.scrollWidth} wide on ${wide}`);
    return out;
  },
  // faint lists texts whose contrast is below WCAG 2.1 AA: 4.5, or 3 where they are large.
  faint() {
    const parse = (c) => (c.match(/[\d.]+/g) || []).map(Number);
    const light = ([r, g, b]) => {
      const f = (v) => ((v /= 255) <= 0.03928 ? v / 12.92 : ((v + 0.055) / 1.055) ** 2.4);
      return 0.2126 * f(r) + 0.7152 * f(g) + 0.0722 * f(b);
    };
    const out = new Set();
    for (const { text, e } of this.texts()) {
      if (e.closest(":disabled")) continue;
      const style = getComputedStyle(e);
      const ink = parse(e instanceof SVGElement ? style.fill : style.color);
      let paper = [255, 255, 255];
      for (let p = e.closest("svg")?.parentElement ?? e; p; p = p.parentElement) {
        const c = parse(getComputedStyle(p).backgroundColor);
        if (c.length && (c.length < 4 || c[3] > 0)) { paper = c; break; }
      }
      const [a, b] = [light(ink), light(paper)];
      const ratio = (Math.max(a, b) + 0.05) / (Math.min(a, b) + 0.05);
      const size = parseFloat(style.fontSize), large = size >= 24 || (size >= 18.66 && Number(style.fontWeight) >= 700);
      if (ratio < (large ? 3 : 4.5)) out.add(`${text}: ${ratio.toFixed(2)}`);
    }
    return [...out];
  },
  // moveTo moves the target as a user does who drags the slider.
  moveTo(stop) {
    const t = document.querySelector("#target");
    t.value = stop;
    t.dispatchEvent(new Event("input", { bubbles: true }));
  },
  // layout returns where everything stands.
  layout() {
    return [...document.querySelectorAll("header, section, .card, .card > *, footer")]
      .filter((e) => e.checkVisibility())
      .map((e) => { const r = e.getBoundingClientRect(); return [r.left, r.top, r.width, r.height].map((v) => v.toFixed(1)).join(" "); });
  },
  // shifts lists the stops at which anything stands elsewhere than at the first.
  shifts() {
    const n = Number(document.querySelector("#target").max), out = [];
    this.moveTo(0);
    const first = this.layout().join();
    for (let i = 1; i <= n; i++) {
      this.moveTo(i);
      if (this.layout().join() !== first) out.push(i);
    }
    return out;
  },
  // card returns what an option shows.
  card(i) {
    const c = document.querySelector(`[data-option="${i}"]`);
    const texts = {};
    for (const e of c.querySelectorAll("[data-text]")) texts[e.dataset.text] = e.textContent;
    return {
      texts, ground: c.querySelector(".after").getAttribute("d"), state: ["meets", "short", "nothing", "open"].filter((s) => c.classList.contains(s)).join(),
      status: c.querySelector("[data-slot=status]").textContent, note: c.querySelector("[data-slot=note]").textContent,
      ghost: c.querySelectorAll(".ghost").length, readout: c.querySelector(".readout").textContent,
    };
  },
  cell(row, column) {
    const e = document.querySelector(`[data-cell="${row} ${column}"]`);
    return `${e.querySelector(".fs").textContent} ${e.querySelector(".mark").textContent}`.trim();
  },
};
