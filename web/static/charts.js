// Reads charts under the pointer and by keyboard. Each svg.chart carries its numbers in
// data-plot (written by web/charts); without this script the chart is simply not read out.
// All listeners sit on the document, so charts that are swapped in later work as well.
"use strict";
(() => {
  const NS = "http://www.w3.org/2000/svg";
  const plots = new WeakMap(); // svg -> {text, plot}: data-plot parsed once
  const layers = new WeakMap(); // svg -> the cross-hair group in it
  let active = null; // {svg, x, byKey}
  let timer = 0;

  const plotOf = (svg) => {
    const text = svg.getAttribute("data-plot");
    if (!text) return null;
    const known = plots.get(svg);
    if (known && known.text === text) return known.plot;
    let plot = null;
    try { plot = JSON.parse(text); } catch { /* a chart that cannot be read stays a picture */ }
    plots.set(svg, { text, plot });
    return plot;
  };

  const node = (tag, cls, text) => {
    const e = document.createElement(tag);
    e.className = cls;
    if (text) e.textContent = text;
    return e;
  };

  // The box and the live region are made when first needed, and again if a swap took them.
  const made = (name) => document.body.querySelector(":scope > ." + name) || document.body.appendChild(node("div", name));
  const box = () => made("read");
  const live = () => {
    const e = made("read-live");
    e.setAttribute("aria-live", "polite");
    return e;
  };

  const decimal = (v, d) => {
    let [whole, frac] = Math.abs(v).toFixed(d).split(".");
    whole = whole.replace(/\B(?=(\d{3})+$)/g, "\u2009");
    const zero = Number(Math.abs(v).toFixed(d)) === 0;
    return (v < 0 && !zero ? "\u2212" : "") + whole + (frac ? "." + frac : "");
  };
  const clock = (s) => {
    const m = Math.round(Math.abs(s) / 60);
    return (s < 0 && m ? "\u2212" : "") + Math.floor(m / 60) + ":" + String(m % 60).padStart(2, "0");
  };
  const withUnit = (t, u) => (u ? t + "\u00a0" + u : t);
  const xText = (a, x) => (a.f === "hm" ? clock(x) : withUnit(decimal(x, a.d), a.u));

  const map = (a, v) => a.p + (a.q - a.p) * ((v - a.a) / (a.b - a.a));

  // The last passage of x counts, as in the table (web/charts, curve.at).
  const at = (xs, ys, x) => {
    for (let j = xs.length - 1; j >= 0; j--) {
      if (xs[j] === x && ys[j] !== null) return ys[j];
      if (j === 0 || ys[j] === null || ys[j - 1] === null) continue;
      const a = xs[j - 1], b = xs[j];
      if (a !== b && (a - x) * (b - x) < 0) return ys[j - 1] + (ys[j] - ys[j - 1]) * ((x - a) / (b - a));
    }
    return null;
  };

  const layerOf = (svg) => {
    let g = layers.get(svg);
    if (g?.parentNode === svg) return g;
    g = document.createElementNS(NS, "g");
    g.setAttribute("class", "hover");
    g.setAttribute("aria-hidden", "true");
    svg.append(g);
    layers.set(svg, g);
    return g;
  };

  const shape = (g, tag, attributes) => {
    const e = document.createElementNS(NS, tag);
    for (const k in attributes) e.setAttribute(k, attributes[k]);
    g.append(e);
  };

  const drawHair = (svg, plot, x, values) => {
    const g = layerOf(svg), px = map(plot.x, x);
    g.replaceChildren();
    for (const k of plot.k) shape(g, "line", { x1: px, x2: px, y1: k.p, y2: k.q });
    plot.s.forEach((s, i) => {
      const k = plot.k[s.k], v = values[i];
      if (v === null || s.c === "none" || v < k.a || v > k.b) return;
      shape(g, "circle", { class: s.c, cx: px, cy: map(k, v), r: 4 });
    });
  };

  const fillBox = (b, plot, x, values) => {
    const rows = node("div", "read-rows");
    plot.s.forEach((s, i) => {
      if (values[i] === null) return;
      rows.append(node("span", "read-key " + (s.c === "none" ? "" : s.c)), node("span", "read-name", s.n),
        node("span", "read-value", withUnit(decimal(values[i], s.d), s.u)));
    });
    b.replaceChildren(node("div", "read-x", plot.x.n + " " + xText(plot.x, x)));
    const span = (plot.w || []).find((w) => x >= w.a && x < w.b);
    if (span) b.append(node("div", "read-span", span.n));
    if (rows.firstChild) b.append(rows);
  };

  // The box stands beside the hair and away from the pointer, inside the window.
  const placeBox = (b, cx, cy) => {
    b.hidden = false;
    const w = b.offsetWidth, h = b.offsetHeight, gap = 16;
    const left = cx + gap + w > innerWidth - 8 ? cx - gap - w : cx + gap;
    b.style.left = Math.max(8, left) + "px";
    b.style.top = Math.min(Math.max(8, cy - h - 10), Math.max(8, innerHeight - h - 8)) + "px";
  };

  const announce = (plot, x, values) => {
    const region = live(); // before its text, or the first one is not spoken
    clearTimeout(timer);
    timer = setTimeout(() => {
      const parts = [plot.x.n + " " + xText(plot.x, x)];
      plot.s.forEach((s, i) => { if (values[i] !== null) parts.push(s.n + " " + withUnit(decimal(values[i], s.d), s.u)); });
      region.textContent = parts.join("; ");
    }, 200);
  };

  const hide = () => {
    clearTimeout(timer);
    if (!active) return;
    layers.get(active.svg)?.remove();
    active = null;
    box().hidden = true;
  };

  const place = (svg, plot, x, clientY) => {
    const top = new DOMPoint(map(plot.x, x), plot.k[0].q).matrixTransform(svg.getScreenCTM());
    placeBox(box(), top.x, clientY === undefined ? top.y + 60 : clientY);
  };

  // A scroll takes the chart from under the pointer, but not from under the keys: the
  // scroll may even be the one by which the chart that takes the focus comes into view.
  const onScroll = () => {
    if (!active) return;
    const plot = active.byKey && active.svg.isConnected && plotOf(active.svg);
    if (plot) place(active.svg, plot, active.x);
    else hide();
  };

  const show = (svg, plot, x, byKey, clientY) => {
    if (active && active.svg !== svg) hide();
    active = { svg, x, byKey };
    const values = plot.s.map((s) => at(plot.v[s.v], s.y, x));
    drawHair(svg, plot, x, values);
    fillBox(box(), plot, x, values);
    place(svg, plot, x, clientY);
    if (byKey) announce(plot, x, values);
  };

  // The chart itself takes no pointer events (charts.css), so it is looked up below
  // the element that was hit.
  const under = (e) => {
    if (!(e.target instanceof Element)) return null;
    for (const svg of e.target.querySelectorAll(":scope > svg.chart[data-plot]")) {
      const r = svg.getBoundingClientRect();
      if (e.clientX >= r.left && e.clientX <= r.right && e.clientY >= r.top && e.clientY <= r.bottom) return svg;
    }
    return e.target.closest("svg.chart[data-plot]");
  };

  const onPointer = (e) => {
    const svg = under(e), plot = svg && plotOf(svg), m = plot && svg.getScreenCTM();
    if (m) {
      const p = new DOMPoint(e.clientX, e.clientY).matrixTransform(m.inverse());
      const last = plot.k[plot.k.length - 1];
      if (p.x >= plot.x.p - 6 && p.x <= plot.x.q + 6 && p.y >= plot.k[0].q - 6 && p.y <= last.p + 6) {
        const t = Math.min(1, Math.max(0, (p.x - plot.x.p) / (plot.x.q - plot.x.p)));
        show(svg, plot, plot.x.a + t * (plot.x.b - plot.x.a), false, e.clientY);
        return;
      }
    }
    if (active && !active.byKey) hide();
  };

  const onKey = (e) => {
    const svg = e.target, plot = svg instanceof Element && svg.matches("svg.chart") && plotOf(svg);
    if (!plot || e.ctrlKey || e.metaKey || e.altKey) return;
    const { a, b } = plot.x, step = (b - a) / (e.shiftKey ? 10 : 100);
    const now = active && active.svg === svg ? active.x : null;
    const next = { ArrowRight: now === null ? a : now + step, ArrowLeft: now === null ? b : now - step, Home: a, End: b }[e.key];
    if (e.key === "Escape") hide();
    if (next === undefined) return;
    e.preventDefault();
    show(svg, plot, Math.min(b, Math.max(a, next)), true);
  };

  document.addEventListener("pointermove", onPointer);
  document.addEventListener("pointerdown", onPointer);
  document.documentElement.addEventListener("pointerleave", () => { if (active && !active.byKey) hide(); });
  document.addEventListener("keydown", onKey);
  document.addEventListener("focusout", (e) => { if (active && active.byKey && e.target === active.svg) hide(); });
  document.addEventListener("scroll", onScroll, { passive: true, capture: true });
})();
