/* The view of the comparison: what is shown, in which order. No element of the page is touched
   here, so that each function can be tried on its own. */
"use strict";

const lampassay = Object.create(null);

(() => {
  const MOST_SIDE = 6;

  const fold = (text) => text.normalize("NFKD").replace(/\p{M}/gu, "").toLowerCase();

  /** A view that shows everything. */
  function emptyView(data) {
    return {
      find: "",
      verdict: "",
      bidder: "",
      reference: "",
      columns: data.columns.filter((column) => column.chosen).map((column) => column.key),
      ranges: [],
      sort: "",
      down: false,
      side: [],
      x: "",
      y: "",
    };
  }

  /** The lamps with their texts made ready for search. */
  function prepared(data) {
    return data.lamps.map((lamp) => fold([lamp.model, lamp.bidder, lamp.id].join("\n")));
  }

  function columnPlaces(data) {
    return new Map(data.columns.map((column, place) => [column.key, place]));
  }

  const verdictTests = {
    clean: (counts) => counts.fail === 0,
    fail: (counts) => counts.fail > 0,
    inconclusive: (counts) => counts.inconclusive > 0,
    "not-measured": (counts) => counts["not-measured"] > 0,
  };

  /** One true or false for each lamp. */
  function matches(data, texts, view) {
    const terms = fold(view.find).split(/\s+/).filter(Boolean);
    const verdict = verdictTests[view.verdict];
    const places = columnPlaces(data);
    const ranges = view.ranges
      .filter((range) => places.has(range.key))
      .map((range) => [places.get(range.key), range.low, range.high]);
    return data.lamps.map((lamp, at) => {
      if (view.bidder && lamp.bidder !== view.bidder) return false;
      if (verdict && !verdict(lamp.counts)) return false;
      if (!terms.every((word) => texts[at].includes(word))) return false;
      return ranges.every(([place, low, high]) => {
        const cell = lamp.cells[place];
        if (cell === null || typeof cell[0] !== "number") return false;
        return (low === null || cell[0] >= low) && (high === null || cell[0] <= high);
      });
    });
  }

  const collator = new Intl.Collator(undefined, { numeric: true, sensitivity: "base" });

  function sortValue(data, lamp, key, places) {
    if (key === "lamp") return lamp.model;
    if (key === "verdicts") return lamp.counts.fail * 1e6 + lamp.counts.inconclusive * 1e3 + lamp.counts["not-measured"];
    const cell = lamp.cells[places.get(key)];
    return cell === null ? null : cell[0];
  }

  /** Places of the lamps in the order of the view; what has no value stands last. */
  function order(data, view) {
    const places = columnPlaces(data);
    const indices = data.lamps.map((_, at) => at);
    if (view.sort !== "lamp" && view.sort !== "verdicts" && !places.has(view.sort)) return indices;
    const values = data.lamps.map((lamp) => sortValue(data, lamp, view.sort, places));
    const way = view.down ? -1 : 1;
    return indices.sort((one, other) => {
      const [a, b] = [values[one], values[other]];
      if (a === null || b === null) return (a === null) - (b === null) || one - other;
      const less = typeof a === "number" && typeof b === "number" ? a - b : collator.compare(String(a), String(b));
      return way * less || one - other;
    });
  }

  const plainNumber = /^[-+]?(?:\d+(?:\.\d*)?|\.\d+)$/;
  const grouped = { ".": /^[-+]?[1-9]\d{0,2}(?:,\d{3})+$/, ",": /^[-+]?[1-9]\d{0,2}(?:\.\d{3})+$/ };

  /** The number that somebody typed, with a point or a comma; null for nothing, not-a-number for
   *  what is no number, or could be read in two ways by those who write `decimal` before decimals. */
  function typedNumber(text, decimal = ".") {
    const typed = text.replace(/\s/g, "").replace("\u2212", "-");
    if (typed === "") return null;
    const plain = typed.replace(",", ".");
    return plainNumber.test(plain) && !grouped[decimal]?.test(typed) ? Number(plain) : NaN;
  }

  /** The view as the fragment of an address; empty for the view that shows everything. */
  function toFragment(data, view) {
    const first = emptyView(data);
    const parts = new URLSearchParams();
    for (const key of ["find", "verdict", "bidder", "reference", "sort", "x", "y"]) {
      if (view[key]) parts.set(key, view[key]);
    }
    if (view.sort && view.down) parts.set("down", "1");
    if (view.columns.join() !== first.columns.join()) parts.set("columns", view.columns.join());
    for (const range of view.ranges) {
      parts.append("range", [range.key, range.low ?? "", range.high ?? ""].join(":"));
    }
    if (view.side.length) parts.set("side", view.side.join());
    return parts.toString();
  }

  /** The view that a fragment tells; whatever it tells amiss is left out. */
  function fromFragment(data, fragment) {
    const view = emptyView(data);
    if (!fragment.includes("=")) return view;
    const parts = new URLSearchParams(fragment);
    const keys = new Set(data.columns.map((column) => column.key));
    const ids = new Set(data.lamps.map((lamp) => lamp.id));
    const bidders = new Set(data.lamps.map((lamp) => lamp.bidder));
    const one = (name, known) => (known(parts.get(name) ?? "") ? parts.get(name) ?? "" : "");
    view.find = parts.get("find") ?? "";
    view.verdict = one("verdict", (text) => Object.hasOwn(verdictTests, text));
    view.bidder = one("bidder", (text) => bidders.has(text));
    view.reference = one("reference", (text) => ids.has(text));
    view.sort = one("sort", (text) => keys.has(text) || text === "lamp" || text === "verdicts");
    view.down = parts.get("down") === "1";
    view.x = one("x", (text) => keys.has(text));
    view.y = one("y", (text) => keys.has(text));
    if (parts.has("columns")) view.columns = parts.get("columns").split(",").filter((key) => keys.has(key));
    view.side = [...new Set((parts.get("side") ?? "").split(","))].filter((id) => ids.has(id)).slice(0, MOST_SIDE);
    for (const text of parts.getAll("range")) {
      const [key, low, high] = text.split(":");
      const [least, most] = [low, high].map((text) => typedNumber(text ?? ""));
      const range = { key, low: Number.isNaN(least) ? null : least, high: Number.isNaN(most) ? null : most };
      if (keys.has(key) && (range.low !== null || range.high !== null)) view.ranges.push(range);
    }
    return view;
  }

  function csvField(value) {
    if (value === null || value === undefined) return "";
    if (typeof value === "number") return String(value);
    // A text that a spreadsheet would take for a formula is kept a text.
    const text = /^[=+\-@\t\r]/.test(value) ? `'${value}` : value;
    return /[",\r\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
  }

  /** What is shown, as CSV (RFC 4180), in the order shown. */
  function toCsv(data, view, shown) {
    const places = columnPlaces(data);
    const columns = data.columns.filter((column) => view.columns.includes(column.key));
    const spread = new Set(
      columns.filter((column) => data.lamps.some((lamp) => lamp.cells[places.get(column.key)]?.[1] != null)).map((column) => column.key),
    );
    const heads = ["lamp_id", "model", "bidder", "verdicts_fail", "verdicts_inconclusive", "verdicts_not_measured", "verdicts_pass"];
    const base = data.lamps.find((lamp) => lamp.id === view.reference);
    if (base) heads.push("reference_lamp");
    for (const column of columns) {
      heads.push(column.key);
      if (column.key === "unit_price") heads.push("currency");
      if (spread.has(column.key)) heads.push(`u_${column.key}`);
      if (base) heads.push(`difference_${column.key}`);
    }
    const rows = shown.map((at) => {
      const lamp = data.lamps[at];
      const row = [lamp.id, lamp.model, lamp.bidder, lamp.counts.fail, lamp.counts.inconclusive, lamp.counts["not-measured"], lamp.counts.pass];
      if (base) row.push(base.id);
      for (const column of columns) {
        const place = places.get(column.key);
        const cell = lamp.cells[place];
        row.push(cell === null ? null : cell[0]);
        if (column.key === "unit_price") row.push(lamp.currency);
        if (spread.has(column.key)) row.push(cell === null ? null : cell[1]);
        if (base) row.push(lamp === base ? null : plainDifference(cell, base.cells[place]));
      }
      return row;
    });
    return [heads, ...rows].map((row) => row.map(csvField).join(",") + "\r\n").join("");
  }

  /** A cell less that of the reference, as a number with the digits of the coarser of the two. */
  function plainDifference(cell, base) {
    if (cell === null || base === null || typeof cell[0] !== "number" || typeof base[0] !== "number") return null;
    return Number((cell[0] - base[0]).toFixed(Math.min(cell[2], base[2])));
  }

  /** Digits as the page prints them: a true minus, and the decimal sign of the page's language. */
  function printed(data, digits) {
    return digits.replace("-", "\u2212").replace(".", data.decimal ?? ".");
  }

  /** A cell less that of the reference: signed, and whether the uncertainties hide it. */
  function difference(data, cell, base) {
    if (cell === null || base === null || typeof cell[0] !== "number" || typeof base[0] !== "number") return null;
    const value = cell[0] - base[0];
    const digits = Math.min(cell[2], base[2]);
    const spread = Math.hypot(cell[1] ?? 0, base[1] ?? 0);
    const size = Math.abs(value).toFixed(digits);
    const sign = Number(size) === 0 ? "" : value > 0 ? "+" : "\u2212";
    return (spread > Math.abs(value) ? "\u2248\u00a0" : "") + sign + printed(data, size);
  }

  /** Put values into a text with names in braces. */
  function filled(text, values) {
    return text.replace(/\{(\w+)\}/g, (_, name) => String(values[name]));
  }

  Object.assign(lampassay, {
    MOST_SIDE, columnPlaces, difference, emptyView, filled, fromFragment, matches, order, prepared, printed, toCsv, toFragment, typedNumber,
  });
})();
