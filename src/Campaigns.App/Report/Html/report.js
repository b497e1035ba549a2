"use strict";
(() => {
  const scrolls = () => {
    for (const box of document.querySelectorAll(".box")) {
      const wide = box.scrollWidth > box.clientWidth + 1;
      if (wide === box.hasAttribute("tabindex")) continue;
      if (wide) {
        box.tabIndex = 0;
        box.setAttribute("role", "region");
        box.setAttribute("aria-labelledby", box.firstElementChild.getAttribute("aria-labelledby"));
      } else {
        for (const name of ["tabindex", "role", "aria-labelledby"]) box.removeAttribute(name);
      }
    }
  };

  // A p-value below the range of doubles is known by its exponent alone.
  const tiny = (text) => {
    const [mantissa, exponent] = text.toLowerCase().split("e");
    return Number(exponent) + Math.log10(Number(mantissa));
  };
  const keyOf = (cell) => {
    const value = cell.dataset.value;
    if (value !== undefined) {
      const number = Number(value);
      return number === 0 && /e-/i.test(value) ? tiny(value) : number;
    }
    const text = cell.textContent.trim();
    return text === "" ? null : text;
  };
  const compare = (a, b) =>
    typeof a === "number" && typeof b === "number" ? a - b
      : typeof a === "number" ? -1 : typeof b === "number" ? 1
      : a.localeCompare(b, "en", { numeric: true });

  const sort = (table, place, head) => {
    const order = { none: "ascending", ascending: "descending", descending: "none" }[head.getAttribute("aria-sort")];
    for (const other of table.tHead.rows[0].cells) other.setAttribute("aria-sort", "none");
    head.setAttribute("aria-sort", order);
    const body = table.tBodies[0];
    const rows = [...body.rows].map((row) => [row, keyOf(row.cells[place])]);
    if (order === "none") {
      rows.sort((a, b) => a[0].dataset.place - b[0].dataset.place);
    } else {
      const sign = order === "ascending" ? 1 : -1;
      rows.sort((a, b) =>
        (a[1] === null) - (b[1] === null)
        || (a[1] === null ? 0 : sign * compare(a[1], b[1]))
        || a[0].dataset.place - b[0].dataset.place);
    }
    body.replaceChildren(...rows.map((r) => r[0]));
  };

  for (const table of document.querySelectorAll("table.sorts")) {
    if (table.tBodies[0].rows.length < 2) continue;
    [...table.tBodies[0].rows].forEach((row, i) => { row.dataset.place = i; });
    [...table.tHead.rows[0].cells].forEach((head, place) => {
      const button = document.createElement("button");
      button.type = "button";
      button.setAttribute("aria-label", `Sort by ${head.textContent}`);
      head.append(" ", button);
      head.setAttribute("aria-sort", "none");
      head.addEventListener("click", () => sort(table, place, head));
    });
  }
  scrolls();
  addEventListener("resize", scrolls);
})();
