/* The drawings that follow the choice: any two figures, and the spectra of chosen lamps. They keep
   to the manner of the drawings that the page came with. */
"use strict";

(() => {
  const SVG = "http://www.w3.org/2000/svg";
  const LINES = [["ink", ""], ["accent", "14 3"], ["bad", "7 2.5"], ["good", "2 2"], ["open", "8 2 2 2"], ["tooth", "4 3"]];

  function element(name, attributes, words) {
    const made = document.createElementNS(SVG, name);
    for (const [key, value] of Object.entries(attributes)) made.setAttribute(key, value);
    if (words !== undefined) made.textContent = words;
    return made;
  }

  /** A drawing with its finding as title. */
  function canvas(width, height, title) {
    const svg = element("svg", { class: "drawing", role: "img", viewBox: `0 0 ${width} ${height}` });
    svg.append(element("title", {}, title));
    const parts = element("g", { "font-family": "Sheet Sans", "font-size": "11" });
    svg.append(parts);
    const add = (name, attributes, words) => parts.append(element(name, attributes, words));
    return {
      svg,
      line: (x1, y1, x2, y2, role, width = 1, dash = "") =>
        add("line", { x1, y1, x2, y2, class: `s-${role}`, "stroke-width": width, ...(dash && { "stroke-dasharray": dash }) }),
      text: (x, y, words, role = "quiet", anchor = "start", weight = "400") =>
        add("text", { x, y, class: `f-${role}`, "text-anchor": anchor, "font-weight": weight }, words),
      dot: (x, y, r, role) => add("circle", { cx: x, cy: y, r, class: `f-${role}` }),
      ring: (x, y, r, role) => add("circle", { cx: x, cy: y, r, class: `s-${role}`, fill: "none", "stroke-width": 1.2 }),
      path: (d, role, width, dash) =>
        add("path", { d, class: `s-${role}`, fill: "none", "stroke-width": width, "stroke-linejoin": "round", ...(dash && { "stroke-dasharray": dash }) }),
    };
  }

  /** Round numbers between two ends. */
  function ticks(low, high, most) {
    const rough = (high - low) / Math.max(most - 1, 1);
    const power = 10 ** Math.floor(Math.log10(rough));
    const step = [1, 2, 5, 10, 20].find((factor) => factor * power >= rough * 0.999) * power;
    const found = [];
    for (let at = Math.ceil(low / step - 1e-9); at <= Math.floor(high / step + 1e-9); at += 1) found.push(Number((at * step).toPrecision(10)));
    return found;
  }

  const labels = (data) => (value) => lampassay.printed(data, String(Number(value.toPrecision(6))));
  const scale = (low, high, start, end) => (value) => start + ((value - low) / (high - low)) * (end - start);

  function ends(values, limits) {
    let low = Math.min(...values.map(([value, spread]) => value - spread));
    let high = Math.max(...values.map(([value, spread]) => value + spread));
    const wide = high - low || Math.abs(high) || 1;
    for (const [limit] of limits) {
      if (limit > low - wide && limit < high + wide) [low, high] = [Math.min(low, limit), Math.max(high, limit)];
    }
    const span = high - low || Math.abs(high) || 1;
    return [low - 0.08 * span, high + 0.08 * span];
  }

  function axes(paper, x, y, frame, label, xName, yName) {
    for (const value of ticks(frame.yLow, frame.yHigh, 6)) {
      paper.line(frame.left, y(value), frame.right, y(value), "hair", 0.6);
      paper.text(frame.left - 5, y(value) + 3.5, label(value), "quiet", "end");
    }
    paper.text(0, 11, yName);
    paper.line(frame.left, frame.base, frame.right, frame.base, "quiet", 0.8);
    for (const value of ticks(frame.xLow, frame.xHigh, 8)) {
      paper.line(x(value), frame.base, x(value), frame.base + 3, "quiet", 0.8);
      paper.text(x(value), frame.base + 14, label(value), "quiet", "middle");
    }
    paper.text(frame.right, frame.base + 28, xName, "quiet", "end");
  }

  const named = (column, words) => (column.unit ? lampassay.filled(words.with_unit, column) : column.label);

  function mark(paper, x, y, counts) {
    if (counts.fail) {
      paper.line(x - 3.6, y - 3.6, x + 3.6, y + 3.6, "bad", 1.8);
      paper.line(x - 3.6, y + 3.6, x + 3.6, y - 3.6, "bad", 1.8);
    } else if (counts.inconclusive || counts["not-measured"] || !counts.pass) paper.ring(x, y, 3.8, "open");
    else paper.dot(x, y, 4.2, "good");
  }

  /** Name the marks where there is room. */
  function names(paper, points, frame) {
    const taken = points.map(({ px, py }) => [px - 5, py - 5, px + 5, py + 5]);
    const free = (box) =>
      box[0] > frame.left && box[2] < frame.right &&
      !taken.some((other) => box[0] < other[2] && other[0] < box[2] && box[1] < other[3] && other[1] < box[3]);
    for (const { px, py, lamp } of points) {
      const wide = 5.8 * lamp.model.length;
      const tries = [[px + 8, py + 4], [px - 8 - wide, py + 4], [px - wide / 2, py - 8], [px - wide / 2, py + 17]];
      for (const [left, base] of tries) {
        const box = [left, base - 10, left + wide, base + 2];
        if (!free(box)) continue;
        taken.push(box);
        paper.text(left, base, lamp.model, "ink");
        break;
      }
    }
  }

  /** Two figures of the lamps shown against each other; the finding in words. */
  function scatter(place, data, shown, xKey, yKey, words) {
    const places = lampassay.columnPlaces(data);
    const [xColumn, yColumn] = [xKey, yKey].map((key) => data.columns[places.get(key)]);
    const points = shown
      .map((at) => data.lamps[at])
      .map((lamp) => ({ lamp, x: lamp.cells[places.get(xKey)], y: lamp.cells[places.get(yKey)] }))
      .filter(({ x, y }) => x !== null && y !== null && typeof x[0] === "number" && typeof y[0] === "number");
    const told = lampassay.filled(words.scatter_note, { up: yColumn.label, across: xColumn.label, count: points.length });
    if (!points.length) {
      place.replaceChildren();
      return told;
    }
    const width = 640;
    const frame = { left: 44, right: width - 20, base: 324, top: 24 };
    [frame.xLow, frame.xHigh] = ends(points.map(({ x }) => [x[0], x[1] ?? 0]), xColumn.limits);
    [frame.yLow, frame.yHigh] = ends(points.map(({ y }) => [y[0], y[1] ?? 0]), yColumn.limits);
    const x = scale(frame.xLow, frame.xHigh, frame.left, frame.right);
    const y = scale(frame.yLow, frame.yHigh, frame.base, frame.top);
    const paper = canvas(width, 360, told);
    const label = labels(data);
    axes(paper, x, y, frame, label, named(xColumn, words), named(yColumn, words));
    for (const [limit, sign] of xColumn.limits) {
      if (limit <= frame.xLow || limit >= frame.xHigh) continue;
      paper.line(x(limit), frame.base, x(limit), frame.top, "ink", 1, "6 3");
      paper.text(x(limit) + 4, frame.top + 4, `${sign} ${label(limit)}`, "ink", "start", "600");
    }
    for (const [limit, sign] of yColumn.limits) {
      if (limit <= frame.yLow || limit >= frame.yHigh) continue;
      paper.line(frame.left, y(limit), frame.right, y(limit), "ink", 1, "6 3");
      paper.text(frame.right, y(limit) - 4, `${sign} ${label(limit)}`, "ink", "end", "600");
    }
    for (const point of points) {
      [point.px, point.py] = [x(point.x[0]), y(point.y[0])];
      if (point.x[1]) paper.line(x(point.x[0] - point.x[1]), point.py, x(point.x[0] + point.x[1]), point.py, "tooth");
      if (point.y[1]) paper.line(point.px, y(point.y[0] - point.y[1]), point.px, y(point.y[0] + point.y[1]), "tooth");
    }
    for (const { px, py, lamp } of points) mark(paper, px, py, lamp.counts);
    if (points.length <= 40) names(paper, points, frame);
    place.replaceChildren(paper.svg);
    return told;
  }

  /** The spectra of chosen lamps over one another. */
  function spectra(place, data, lamps, words) {
    const { first_nm: first, step_nm: step, permille } = data.spectra;
    const known = lamps.filter((lamp) => permille[lamp.id]);
    if (!known.length) {
      place.replaceChildren();
      return;
    }
    const last = first + step * (permille[known[0].id].length - 1);
    const frame = { left: 40, right: 548, base: 220, top: 20, xLow: first, xHigh: last, yLow: 0, yHigh: 105 };
    const x = scale(first, last, frame.left, frame.right);
    const y = scale(0, 105, frame.base, frame.top);
    const paper = canvas(560, 262 + 16 * known.length, lampassay.filled(words.spectra_title, { models: known.map((lamp) => lamp.model).join(", ") }));
    axes(paper, x, y, frame, labels(data), words.wavelength, words.spectra_scale);
    known.forEach((lamp, at) => {
      const [role, dash] = LINES[at];
      let pen = "M";
      let d = "";
      permille[lamp.id].forEach((value, index) => {
        if (value === null) {
          pen = "M";
          return;
        }
        d += `${pen}${x(first + index * step).toFixed(1)} ${y(value / 10).toFixed(1)}`;
        pen = "L";
      });
      paper.path(d, role, 1.5, dash);
      const line = 268 + 16 * at;
      paper.line(frame.left, line, frame.left + 32, line, role, 1.8, dash);
      paper.text(frame.left + 40, line + 4, lamp.model, "ink");
    });
    place.replaceChildren(paper.svg);
  }

  Object.assign(lampassay, { named, scatter, spectra });
})();
