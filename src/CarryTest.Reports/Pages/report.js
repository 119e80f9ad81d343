"use strict";
// The page is whole without this script; with it tables sort and filter, rows open in place, and curves can be read.
(() => {
  const dayZero = 719162; // the day number of 1970-01-01 counted from 0001-01-01

  const valueOf = (cell) => {
    const text = cell.textContent.trim();
    const number = Number(text.replace(/[,\s%+]/g, "").replace("\u2212", "-"));
    return text === "" || Number.isNaN(number) ? text : number;
  };

  const compare = (a, b) => {
    if (typeof a === "number" && typeof b === "number") { return a - b; }
    if (typeof a === "number") { return -1; }
    if (typeof b === "number") { return 1; }
    return a < b ? -1 : a > b ? 1 : 0;
  };

  const closeRows = (table) => {
    table.querySelectorAll("tr.opened").forEach((row) => row.remove());
    table.querySelectorAll("a[aria-expanded=true]").forEach((link) => link.setAttribute("aria-expanded", "false"));
  };

  const sortBy = (table, column, head) => {
    closeRows(table);
    const descending = head.getAttribute("aria-sort") === "ascending";
    table.querySelectorAll("th").forEach((other) => other.removeAttribute("aria-sort"));
    head.setAttribute("aria-sort", descending ? "descending" : "ascending");
    const body = table.tBodies[0];
    const rows = [...body.rows].map((row, place) => ({ row, place, value: valueOf(row.cells[column]) }));
    rows.sort((a, b) => (descending ? -1 : 1) * compare(a.value, b.value) || a.place - b.place);
    body.append(...rows.map((r) => r.row));
  };

  const addFilter = (table) => {
    const label = document.createElement("label");
    label.className = "filter";
    const input = document.createElement("input");
    input.type = "search";
    const count = document.createElement("output");
    label.append("Filter ", input, count);
    table.closest(".box").before(label);
    input.addEventListener("input", () => {
      closeRows(table);
      const wanted = input.value.trim().toLowerCase();
      let shown = 0;
      for (const row of table.tBodies[0].rows) {
        row.hidden = !row.textContent.toLowerCase().includes(wanted);
        shown += row.hidden ? 0 : 1;
      }
      count.textContent = wanted === "" ? "" : `${shown} of ${table.tBodies[0].rows.length} rows`;
    });
  };

  for (const table of document.querySelectorAll("table.sorts")) {
    if (table.tBodies[0].rows.length < 2) { continue; }
    [...table.tHead.rows[0].cells].forEach((head, column) => {
      const button = document.createElement("button");
      button.type = "button";
      button.append(...head.childNodes);
      head.append(button);
      button.addEventListener("click", () => sortBy(table, column, head));
    });
    if (table.tBodies[0].rows.length > 8) { addFilter(table); }
  }

  const packages = document.querySelector("#packages table");
  for (const link of packages ? packages.querySelectorAll("a[href^='#package-']") : []) {
    link.setAttribute("aria-expanded", "false");
    link.addEventListener("click", (event) => {
      const life = document.getElementById(link.getAttribute("href").slice(1));
      if (!life || event.ctrlKey || event.metaKey || event.shiftKey) { return; }
      event.preventDefault();
      const row = link.closest("tr");
      if (link.getAttribute("aria-expanded") === "true") {
        row.nextElementSibling.remove();
        link.setAttribute("aria-expanded", "false");
        return;
      }
      const opened = document.createElement("tr");
      opened.className = "opened";
      const cell = opened.insertCell();
      cell.colSpan = row.cells.length;
      const inside = life.cloneNode(true);
      inside.removeAttribute("id");
      cell.append(inside);
      row.after(opened);
      link.setAttribute("aria-expanded", "true");
    });
  }

  const openTarget = () => {
    const target = location.hash.startsWith("#package-") ? document.getElementById(location.hash.slice(1)) : null;
    if (target) {
      target.closest("details").open = true;
      target.closest("details").scrollIntoView();
    }
  };
  window.addEventListener("hashchange", openTarget);
  openTarget();

  for (const figure of document.querySelectorAll("figure[data-curves]")) {
    const curves = JSON.parse(figure.dataset.curves);
    const numbers = curves.days.map((day) => Date.parse(day + "T00:00:00Z") / 86400000 + dayZero);
    const reader = document.createElement("div");
    reader.className = "reader";
    const slider = document.createElement("input");
    slider.type = "range";
    slider.min = "0";
    slider.max = String(numbers.length - 1);
    slider.value = slider.max;
    slider.setAttribute("aria-label", "Day to read");
    const output = document.createElement("output");
    reader.append(slider, output);
    figure.append(reader);

    const panels = [...figure.querySelectorAll("g.panel")].map((group) => {
      const [left, top, width, height] = group.dataset.plot.split(" ").map(Number);
      const [low, high] = group.dataset.range.split(" ").map(Number);
      const line = group.querySelector("path").cloneNode(false);
      line.setAttribute("class", "cursor");
      line.setAttribute("d", "");
      group.append(line);
      return { group, left, top, width, height, low, high, line };
    });

    const read = (index, quiet) => {
      slider.value = String(index);
      const values = curves.names.map((name, i) => `${name} ${curves.values[i][index].toLocaleString("en-US", { minimumFractionDigits: Number.isInteger(curves.values[i][index]) ? 0 : 2, maximumFractionDigits: 2 }).replace("-", "\u2212")}`);
      output.textContent = `${curves.days[index]}: ${values.join(", ")}`;
      slider.setAttribute("aria-valuetext", output.textContent);
      for (const p of panels) {
        const x = p.left + (p.width * (numbers[index] - p.low)) / (p.high - p.low);
        p.line.setAttribute("d", quiet ? "" : `M${x} ${p.top}v${p.height}`);
      }
    };

    // The last day that is not after the place pointed at: a value holds until the next.
    const indexAt = (number) => {
      let low = 0;
      let high = numbers.length - 1;
      while (low < high) {
        const middle = Math.ceil((low + high) / 2);
        if (numbers[middle] <= number) { low = middle; } else { high = middle - 1; }
      }
      return low;
    };

    slider.addEventListener("input", () => read(Number(slider.value), false));
    for (const svg of figure.querySelectorAll("svg")) {
      svg.addEventListener("pointermove", (event) => {
        const panel = panels.find((p) => svg.contains(p.group));
        const box = svg.getBoundingClientRect();
        const x = ((event.clientX - box.left) * svg.viewBox.baseVal.width) / box.width;
        const at = panel.low + ((panel.high - panel.low) * (x - panel.left)) / panel.width;
        read(indexAt(at), false);
      });
    }
    read(numbers.length - 1, true);
  }
})();
