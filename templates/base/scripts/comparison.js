/* The controls of the comparison. The page is whole without this; only choosing is lost. */
"use strict";

(() => {
  const { MOST_SIDE, columnPlaces, difference, emptyView, filled, fromFragment, matches, order, prepared, printed, toCsv, toFragment, typedNumber } = lampassay;
  const byId = (id) => document.getElementById(id);
  const data = JSON.parse(byId("comparison-data").textContent);
  const words = data.words;
  const texts = prepared(data);
  const places = columnPlaces(data);
  const lampPlaces = new Map(data.lamps.map((lamp, at) => [lamp.id, at]));
  const table = byId("matrix");
  const body = table.tBodies[0];
  const rows = [...body.rows];
  const FIRST = 2; // cells before the first column: the lamp, its verdicts
  const picks = [];
  const followWait = 120; // [ms]
  const fillWait = 30;
  const STEP = 50; // rows on the page, however many lamps match
  const ROW = 80; // no row is lower [px]

  let view = emptyView(data);
  let most = STEP;
  let matching = data.lamps.map(() => true);
  let placed = data.lamps.map((_, at) => at);
  let drawn = "";
  let waiting = 0;
  let told = "";
  let remembered = "";
  let turn = 0;
  let atOnce = 0;
  let scrolled = false;

  function made(name, properties = {}, ...children) {
    const element = Object.assign(document.createElement(name), properties);
    element.append(...children);
    return element;
  }

  /** A number and its uncertainty as printed; a class has no uncertainty. */
  function cellTexts([value, spread, digits]) {
    if (typeof value !== "number") return [value, ""];
    const text = (number) => printed(data, number.toFixed(digits));
    return [text(value), spread === null ? "" : `\u00b1\u00a0${text(spread)}`];
  }

  const shownLamps = () => placed.filter((at) => matching[at]);
  const columnAt = (key) => data.columns[places.get(key)];
  const columnName = (key) => (key === "lamp" ? words.lamp : key === "verdicts" ? words.verdicts : columnAt(key).label);

  /* ---- the parts of the page that follow the view ---- */

  function say(text) {
    if (text === told) return;
    told = text;
    byId("status").textContent = text;
  }

  function countText() {
    const count = matching.filter(Boolean).length;
    return filled(count > most ? words.shown_first : words.shown, { shown: count, all: rows.length, first: most });
  }

  function filterRows() {
    matching = matches(data, texts, view);
    byId("nothing").hidden = matching.includes(true);
  }

  /* The table holds the first rows of the answer and nothing else. A step sets as many rows as a
     window shows; the others follow frame by frame, and what stands there is always right. */

  /** Set the first rows of the answer, so many of them new; true where that is all of them. */
  function setRows(budget) {
    const base = data.lamps[lampPlaces.get(view.reference)];
    const wanted = shownLamps().slice(0, most);
    const kept = new Set(wanted.map((at) => rows[at]));
    for (const row of [...body.children]) if (!kept.has(row)) row.remove();
    let next = body.firstElementChild;
    let left = budget;
    for (const at of wanted) {
      const row = rows[at];
      const stands = row === next;
      if (!stands || (base && row.dataset.base !== base.id)) left -= 1;
      if (left < 0) break;
      if (stands) next = next.nextElementSibling;
      if (base) writeDifferences(at, base);
      if (!stands) body.insertBefore(row, next);
    }
    while (next) [next] = [next.nextElementSibling, next.remove()];
    return left >= 0;
  }

  function setRowsInTurn() {
    turn += 1;
    const own = turn;
    if (setRows(atOnce)) return;
    requestAnimationFrame(() => setTimeout(() => own === turn && setRowsInTurn(), fillWait));
  }

  function layOutRows() {
    const count = matching.filter(Boolean).length;
    setRowsInTurn();
    byId("more").hidden = count <= most;
    byId("show-all").textContent = filled(words.show_all, { count });
  }

  function toTop() {
    if (scrolled) table.parentElement.scrollTop = 0;
    scrolled = false;
  }

  function sortRows() {
    placed = order(data, view);
    for (const heading of table.tHead.rows[0].cells) {
      const key = heading.dataset.key;
      if (key && key === view.sort) heading.setAttribute("aria-sort", view.down ? "descending" : "ascending");
      else heading.removeAttribute("aria-sort");
    }
  }

  const columnStyle = new CSSStyleSheet();
  document.adoptedStyleSheets = [...document.adoptedStyleSheets, columnStyle];

  function showColumns() {
    const hidden = data.columns.map((column, at) => (view.columns.includes(column.key) ? "" : `#matrix tr > :nth-child(${at + FIRST + 1})`)).filter(Boolean);
    columnStyle.replaceSync(hidden.length ? `${hidden.join(",")}{display:none}` : "");
    for (const box of document.querySelectorAll('input[name="column"]')) box.checked = view.columns.includes(box.value);
  }

  function showDifferences() {
    const base = data.lamps[lampPlaces.get(view.reference)];
    table.classList.toggle("differences", Boolean(base));
    byId("side-table").classList.toggle("differences", Boolean(base));
    const legend = byId("difference-legend");
    legend.hidden = !base;
    if (base) legend.textContent = filled(words.difference_legend, { model: base.model });
    for (const [at, row] of rows.entries()) row.classList.toggle("reference", data.lamps[at] === base);
  }

  function writeDifferences(at, base) {
    const [row, lamp] = [rows[at], data.lamps[at]];
    if (row.dataset.base === base.id) return;
    row.dataset.base = base.id;
    for (const column of data.columns) {
      const place = places.get(column.key);
      const cell = row.cells[place + FIRST];
      const text = lamp === base ? null : difference(data, lamp.cells[place], base.cells[place]);
      let span = cell.querySelector(".difference");
      if (text === null) {
        span?.remove();
        continue;
      }
      if (!span) {
        span = made("span", { className: "difference" });
        cell.prepend(span, " ");
      }
      span.textContent = text;
    }
  }

  function rangeText({ key, low, high }) {
    const told = low === null ? words.range_to : high === null ? words.range_from : words.range_between;
    const [least, most] = [low, high].map((number) => printed(data, String(number)));
    return filled(told, { column: columnName(key), low: least, high: most });
  }

  function showRanges() {
    const list = byId("ranges");
    list.hidden = !view.ranges.length;
    list.replaceChildren(
      ...view.ranges.map((range) => {
        const text = rangeText(range);
        const button = made("button", { type: "button" }, `${text} \u00d7`);
        button.setAttribute("aria-label", filled(words.range_remove, { range: text }));
        button.addEventListener("click", () => {
          change({ ranges: view.ranges.filter((other) => other !== range) });
          byId("find").focus();
        });
        return made("li", {}, button);
      }),
    );
  }

  function showSide() {
    const lamps = view.side.map((id) => data.lamps[lampPlaces.get(id)]);
    byId("side").hidden = !lamps.length;
    for (const [at, box] of picks.entries()) box.checked = view.side.includes(data.lamps[at].id);
    if (!lamps.length) return;
    const base = data.lamps[lampPlaces.get(view.reference)];
    if (base) for (const lamp of lamps) writeDifferences(lampPlaces.get(lamp.id), base);
    const head = byId("side-table").tHead.rows[0];
    head.replaceChildren(head.cells[0], ...lamps.map(sideHeading));
    const lines = [sideLine(words.verdicts, "", lamps, 1)];
    for (const [at, column] of data.columns.entries()) lines.push(sideLine(column.label, column.unit, lamps, at + FIRST));
    byId("side-table").tBodies[0].replaceChildren(...lines);
    lampassay.spectra(byId("side-spectra"), data, lamps, words);
  }

  function sideHeading(lamp) {
    const link = rows[lampPlaces.get(lamp.id)].querySelector("a.model").cloneNode(true);
    const button = made("button", { type: "button" }, "\u00d7");
    button.setAttribute("aria-label", filled(words.side_remove, { model: lamp.model }));
    button.addEventListener("click", () => {
      pick(lamp.id, false);
      (view.side.length ? byId("side-heading") : byId("find")).focus();
    });
    return made("th", { scope: "col" }, link, " ", button);
  }

  function sideLine(label, unit, lamps, place) {
    const heading = made("th", { scope: "row" }, label);
    if (unit) heading.append(" ", made("span", { className: "unit" }, unit));
    const cells = lamps.map((lamp) => {
      const cell = rows[lampPlaces.get(lamp.id)].cells[place].cloneNode(true);
      return cell;
    });
    return made("tr", {}, heading, ...cells);
  }

  /* ---- drawings and the address follow a moment later, so that a filter answers at once ---- */

  const firstPlot = [...(byId("pair-plot")?.childNodes ?? [])];
  const firstCaption = byId("pair-caption").textContent;
  const pairTable = byId("pair-numbers")?.querySelector("table");
  const firstPair = pairTable && [...pairTable.tHead.rows[0].childNodes, ...pairTable.tBodies[0].childNodes];
  const firstHead = pairTable && [...pairTable.tHead.rows[0].childNodes];
  const firstBody = pairTable && [...pairTable.tBodies[0].childNodes];

  function drawPair() {
    if (!byId("pair-plot") || !firstPair) return;
    const [x, y] = [view.x || data.pair[0], view.y || data.pair[1]];
    byId("pair-x").value = x;
    byId("pair-y").value = y;
    const shown = [...shownLamps()].sort((one, other) => one - other);
    const wanted = JSON.stringify([x, y, shown]);
    if (wanted === drawn) return;
    drawn = wanted;
    if (x === data.pair[0] && y === data.pair[1] && shown.length === rows.length) {
      byId("pair-plot").replaceChildren(...firstPlot);
      byId("pair-caption").textContent = firstCaption;
      pairTable.tHead.rows[0].replaceChildren(...firstHead);
      pairTable.tBodies[0].replaceChildren(...firstBody);
      return;
    }
    byId("pair-caption").textContent = lampassay.scatter(byId("pair-plot"), data, shown, x, y, words);
    writePairTable(shown, x, y);
  }

  function writePairTable(shown, x, y) {
    const heading = (text) => made("th", { scope: "col" }, text);
    const told = (cell) => (cell === null ? words.none : cellTexts(cell).filter(Boolean).join(" "));
    pairTable.tHead.rows[0].replaceChildren(heading(words.lamp), ...[x, y].map((key) => heading(lampassay.named(columnAt(key), words))));
    pairTable.tBodies[0].replaceChildren(
      ...shown.map((at) => {
        const lamp = data.lamps[at];
        const cells = [x, y].map((key) => made("td", {}, told(lamp.cells[places.get(key)])));
        return made("tr", {}, made("th", { scope: "row" }, lamp.model), ...cells);
      }),
    );
  }

  function followSoon() {
    clearTimeout(waiting);
    waiting = setTimeout(() => {
      remember();
      drawPair();
    }, followWait);
  }

  /* ---- from one view to the next ---- */

  function remember() {
    const fragment = toFragment(data, view);
    if (fragment === remembered) return;
    remembered = fragment;
    for (const link of document.querySelectorAll(".languages a")) link.hash = fragment;
    try {
      history.replaceState(null, "", fragment ? `#${fragment}` : location.pathname + location.search);
    } catch {
      location.hash = fragment;
    }
  }

  function fillFields() {
    byId("find").value = view.find;
    byId("verdict").value = view.verdict;
    if (byId("bidder")) byId("bidder").value = view.bidder;
    byId("reference").value = view.reference;
  }

  /** Take up some parts of a view, and show what follows from them. */
  function change(parts, announce = "") {
    const before = view;
    view = { ...view, ...parts };
    const changed = (...keys) => keys.some((key) => before[key] !== view[key]);
    if (changed("columns")) showColumns();
    if (changed("find", "verdict", "bidder", "ranges")) {
      most = STEP;
      filterRows();
    }
    if (changed("sort", "down")) sortRows();
    if (changed("reference")) showDifferences();
    if (changed("find", "verdict", "bidder", "ranges", "sort", "down", "reference")) {
      layOutRows();
      toTop();
    }
    if (changed("ranges")) showRanges();
    if (changed("side", "reference")) showSide();
    followSoon();
    say(announce || countText());
  }

  function restore() {
    if (location.hash.length > 1 && !location.hash.includes("=")) return;
    change(fromFragment(data, location.hash.slice(1)));
    remembered = toFragment(data, view);
    fillFields();
  }

  function sortBy(key) {
    const better = key === "lamp" ? -1 : key === "verdicts" ? -1 : columnAt(key).better;
    const down = view.sort === key ? !view.down : better > 0;
    const way = down ? words.descending : words.ascending;
    change({ sort: key, down }, filled(words.sorted, { column: columnName(key), way }));
  }

  function pick(id, chosen) {
    if (chosen && view.side.length >= MOST_SIDE) {
      showSide();
      say(words.side_full);
      return;
    }
    const side = view.side.filter((other) => other !== id);
    if (chosen) side.push(id);
    change({ side }, filled(words.side_lamps, { count: side.length }));
  }

  function addRange() {
    const fields = ["range-low", "range-high"].map(byId);
    const [low, high] = fields.map((field) => typedNumber(field.value, data.decimal));
    for (const [at, number] of [low, high].entries()) fields[at].setAttribute("aria-invalid", String(Number.isNaN(number)));
    const unread = fields.find((field) => field.getAttribute("aria-invalid") === "true");
    if (unread) {
      say(filled(words.range_unread, { text: unread.value }));
      unread.focus();
      return;
    }
    if (low === null && high === null) {
      fields[0].focus();
      return;
    }
    if (low !== null && high !== null && low > high) {
      for (const field of fields) field.setAttribute("aria-invalid", "true");
      say(words.range_reversed);
      fields[0].focus();
      return;
    }
    const key = byId("range-figure").value;
    change({ ranges: [...view.ranges.filter((range) => range.key !== key), { key, low, high }] });
    for (const id of ["range-low", "range-high"]) byId(id).value = "";
  }

  async function copyText(text) {
    try {
      await navigator.clipboard.writeText(text);
      say(words.copied);
    } catch {
      const field = made("textarea", { value: text, readOnly: true, className: "out-of-sight" });
      field.setAttribute("aria-hidden", "true");
      document.body.append(field);
      field.select();
      say(document.execCommand("copy") ? words.copied : words.copy_failed);
      field.remove();
    }
  }

  function download() {
    const address = URL.createObjectURL(new Blob([toCsv(data, view, shownLamps())], { type: "text/csv;charset=utf-8" }));
    const link = made("a", { href: address, download: "comparison.csv", hidden: true });
    document.body.append(link);
    link.click();
    link.remove();
    setTimeout(() => URL.revokeObjectURL(address), 10000);
  }

  /** How many rows a window shows: the table takes nine tenths of its height, a row of it the headings. */
  function measure() {
    atOnce = Math.max(6, Math.ceil((0.9 * innerHeight) / ROW) - 1);
  }

  function layOut(count) {
    most = count;
    layOutRows();
    say(countText());
  }

  /* ---- the controls ---- */

  function sortable(heading, key) {
    heading.dataset.key = key;
    const button = made("button", { type: "button" });
    button.append(...heading.childNodes);
    if (!button.querySelector(".label")) button.replaceChildren(made("span", { className: "label" }, button.textContent));
    button.addEventListener("click", () => sortBy(key));
    heading.append(button);
  }

  function addPick(row, lamp) {
    const box = made("input", { type: "checkbox" });
    box.setAttribute("aria-label", filled(words.compare, { model: lamp.model }));
    box.addEventListener("change", () => pick(lamp.id, box.checked));
    picks.push(box);
    row.cells[0].append(made("label", { className: "pick" }, box, words.compare_short));
  }

  /* Widths that hang on all lamps and not on those that stand there: no column moves when the rows
     change, and the table need not be measured again. */

  const DIGIT = 0.62; // of a number, its uncertainty and a heading [rem]
  const SMALL = 0.47;
  const LETTER = 0.5;
  const RULER = 6;

  function widthOf(column, at) {
    const longest = Math.max(...column.label.split(/[\s\u00ad-]/).map((word) => word.length));
    const cells = data.lamps.map((lamp) => lamp.cells[at]).filter((cell) => cell !== null);
    const wide = cells.map((cell) => {
      const [number, spread] = cellTexts(cell);
      return DIGIT * number.length + (spread ? SMALL * (spread.length + 2) : 0);
    });
    return wide.reduce((most, each) => Math.max(most, each), Math.max(RULER, LETTER * longest));
  }

  function fixWidths(headings) {
    data.columns.forEach((column, at) => { headings[at + FIRST].style.width = `${widthOf(column, at).toFixed(2)}rem`; });
    table.classList.add("laid");
  }

  const option = (column) => made("option", { value: column.key }, column.label);

  function build() {
    const headings = [...table.tHead.rows[0].cells];
    ["lamp", "verdicts", ...data.columns.map((column) => column.key)].forEach((key, at) => sortable(headings[at], key));
    fixWidths(headings);
    rows.forEach((row, at) => addPick(row, data.lamps[at]));
    const numbers = data.columns.filter((column) => column.number);
    byId("range-figure").append(...numbers.map(option));
    for (const id of ["pair-x", "pair-y"]) byId(id).append(...numbers.map(option));
    byId("controls").hidden = false;
    byId("pair-controls").hidden = !pairTable;
  }

  function listen() {
    byId("find").addEventListener("input", (event) => change({ find: event.target.value }));
    for (const key of ["verdict", "bidder", "reference"]) byId(key)?.addEventListener("change", (event) => change({ [key]: event.target.value }));
    byId("pair-x").addEventListener("change", (event) => change({ x: event.target.value }));
    byId("pair-y").addEventListener("change", (event) => change({ y: event.target.value }));
    byId("column-choice").addEventListener("change", () => {
      const ticked = [...document.querySelectorAll('input[name="column"]:checked')].map((box) => box.value);
      change({ columns: ticked });
    });
    byId("columns-few").addEventListener("click", () => change({ columns: emptyView(data).columns }));
    byId("columns-all").addEventListener("click", () => change({ columns: data.columns.map((column) => column.key) }));
    byId("range-add").addEventListener("click", addRange);
    for (const id of ["range-low", "range-high"]) {
      byId(id).addEventListener("keydown", (event) => {
        if (event.key === "Enter") addRange();
      });
    }
    byId("download").addEventListener("click", download);
    byId("copy").addEventListener("click", () => copyText(toCsv(data, view, shownLamps())));
    byId("link").addEventListener("click", () => {
      remember();
      copyText(location.href);
    });
    byId("reset").addEventListener("click", () => {
      change(emptyView(data));
      fillFields();
    });
    byId("side-clear").addEventListener("click", () => {
      change({ side: [] });
      byId("find").focus();
    });
    byId("show-more").addEventListener("click", () => layOut(most + STEP));
    byId("show-all").addEventListener("click", () => layOut(Infinity));
    let before = most;
    addEventListener("beforeprint", () => {
      before = most;
      layOut(Infinity);
      setRows(Infinity);
    });
    addEventListener("afterprint", () => layOut(before));
    addEventListener("hashchange", restore);
    addEventListener("resize", measure);
    const scroller = table.parentElement;
    scroller.addEventListener("scroll", () => { scrolled = scroller.scrollTop > 0; }, { passive: true });
  }

  build();
  listen();
  measure();
  showColumns();
  layOutRows();
  say(countText());
  restore();
})();
