// Tables sort by a button in each heading; boxes that do not scroll leave the
// tab order. Nothing on the page needs this.
"use strict";
(function () {
  const said = document.getElementById("said");
  const byText = new Intl.Collator("en", { numeric: true });

  function key(cell, number) {
    if (!number) return cell.textContent.trim();
    return cell.dataset.value ? Number(cell.dataset.value) : null;
  }

  // Missing values stay last, whichever way the table is sorted.
  function compare(a, b, number, sign) {
    if (a === null || b === null) return (a === null) - (b === null);
    return sign * (number ? a - b : byText.compare(a, b));
  }

  function sort(table, column, heading) {
    const up = heading.getAttribute("aria-sort") !== "ascending";
    const number = heading.classList.contains("number");
    const body = table.tBodies[0];
    const rows = Array.from(body.rows, function (row) {
      return { row: row, key: key(row.cells[column], number) };
    });
    rows.sort(function (a, b) { return compare(a.key, b.key, number, up ? 1 : -1); });
    body.append(...rows.map(function (r) { return r.row; }));
    table.querySelectorAll("th[aria-sort]").forEach(function (th) { th.removeAttribute("aria-sort"); });
    heading.setAttribute("aria-sort", up ? "ascending" : "descending");
    said.textContent = "Sorted by " + heading.textContent.trim() + (up ? ", ascending" : ", descending");
  }

  document.querySelectorAll("table.sorts").forEach(function (table) {
    Array.from(table.tHead.rows[0].cells).forEach(function (heading, column) {
      const button = document.createElement("button");
      button.type = "button";
      button.append(...heading.childNodes);
      heading.append(button);
      button.addEventListener("click", function () { sort(table, column, heading); });
    });
  });

  const boxes = new ResizeObserver(function (entries) {
    entries.forEach(function (e) {
      const scrolls = e.target.scrollWidth > e.target.clientWidth + 1;
      if (scrolls) e.target.setAttribute("tabindex", "0");
      else e.target.removeAttribute("tabindex");
      e.target.classList.toggle("scrolls", scrolls);
    });
  });
  document.querySelectorAll(".scroll").forEach(function (box) { boxes.observe(box); });
})();
