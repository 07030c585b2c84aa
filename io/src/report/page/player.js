// The field player: instants of the stored fields in colour with flux lines; reading by hover, keys, or a place typed in.

class Player {
  constructor(root, about, data) {
    Object.assign(this, { root, about, data, arrays: new Map(), index: 0, timer: null, cell: null });
    this.grid = about.grid;
    this.columns = this.grid.r_centres.length;
    this.starts = [];
    let start = 0;
    for (const instant of about.instants) {
      this.starts.push(start);
      start += instant.rows;
    }
    this.find = (id) => root.querySelector(`#field-${id}`);
    this.plot = this.find("plot");
  }

  async begin() {
    const choice = this.find("quantity");
    this.about.quantities.forEach((q, i) => choice.append(new Option(withUnit(q), String(i))));
    const slider = this.find("instant");
    slider.max = String(this.about.instants.length - 1);
    if (this.about.instants.length < 2) this.find("play").parentElement.hidden = true;
    this.index = this.strongest(await this.array(this.about.quantities[0].arrays[0], 0));
    slider.value = String(this.index);
    this.psi = await this.array("psi", 1);
    this.listen();
    await this.show();
    this.fit(this.find("view").value);
  }

  // The instant of the greatest value: the one worth seeing first.
  strongest(values) {
    let [best, at] = [-1, 0];
    this.about.instants.forEach((instant, k) => {
      const from = this.starts[k] * this.columns;
      for (let i = from; i < from + instant.rows * this.columns; i++) {
        if (Math.abs(values[i]) > best) [best, at] = [Math.abs(values[i]), k];
      }
    });
    return at;
  }

  // An array by name, unpacked once; `more` is 1 at nodes.
  async array(name, more) {
    if (!this.arrays.has(name)) {
      const rows = this.about.instants.map((i) => i.rows + more);
      this.arrays.set(name, await unpacked(this.data.get(name), rows, this.columns + more));
    }
    return this.arrays.get(name);
  }

  get quantity() {
    return this.about.quantities[Number(this.find("quantity").value)];
  }

  get instant() {
    return this.about.instants[this.index];
  }

  listen() {
    const slider = this.find("instant");
    slider.addEventListener("input", () => this.go(Number(slider.value)));
    slider.addEventListener("keydown", (event) => {
      if (event.key !== " ") return;
      event.preventDefault();
      this.play(this.timer === null);
    });
    this.find("play").addEventListener("click", () => this.play(this.timer === null));
    for (const id of ["quantity", "lines", "own-scale"]) this.find(id).addEventListener("change", () => this.show());
    this.find("view").addEventListener("change", (event) => this.fit(event.target.value));
    this.plot.addEventListener("keydown", (event) => this.key(event));
    this.find("place").addEventListener("submit", (event) => {
      event.preventDefault();
      this.readAt(Number(this.find("r").value) / 1e3, Number(this.find("z").value) / 1e3);
    });
  }

  play(on) {
    clearInterval(this.timer);
    this.timer = null;
    const button = this.find("play");
    button.textContent = on ? "Pause" : "Play";
    button.setAttribute("aria-pressed", String(on));
    if (!on) return;
    if (this.index === this.about.instants.length - 1) this.go(0);
    const calm = matchMedia("(prefers-reduced-motion: reduce)").matches;
    this.timer = setInterval(() => {
      if (this.index + 1 < this.about.instants.length) this.go(this.index + 1);
      else this.play(false);
    }, calm ? 1500 : 450);
  }

  async go(index) {
    this.index = Math.max(0, Math.min(this.about.instants.length - 1, index));
    this.find("instant").value = String(this.index);
    await this.show();
    if (this.find("view").value === "mover") this.fit("mover");
    if (this.cell) this.read(this.cell.row, this.cell.column, this.cell.left);
  }

  // Values of the shown quantity at this instant, row by row, in the shown unit.
  async values(quantity) {
    const parts = await Promise.all(quantity.arrays.map((name) => this.array(name, 0)));
    const start = this.starts[this.index] * this.columns;
    const count = this.instant.rows * this.columns;
    const out = new Float64Array(count);
    for (let i = 0; i < count; i++) {
      const value = parts.length === 1 ? parts[0][start + i] : Math.hypot(parts[0][start + i], parts[1][start + i]);
      out[i] = value * quantity.factor + quantity.offset;
    }
    return out;
  }

  async show() {
    const quantity = this.quantity;
    this.shown = await this.values(quantity);
    const traces = [this.colours(quantity)];
    if (this.find("lines").checked && this.about.flux_step > 0) traces.push(this.fluxLines());
    await Plotly.react(this.plot, traces, this.layout(), { ...OPTIONS, scrollZoom: true });
    if (!this.wired) {
      this.wired = true;
      this.plot.on("plotly_hover", (event) => this.hovered(event));
    }
    this.tellTime();
    showInstant(this.instant.time);
  }

  // Both halves: the left one is the right one's mirror image.
  mirrored(row) {
    return [...row].reverse().concat([...row]);
  }

  colours(quantity) {
    const rows = [];
    for (let j = 0; j < this.instant.rows; j++) rows.push(this.mirrored(this.shown.subarray(j * this.columns, (j + 1) * this.columns)));
    const radii = this.grid.r_edges.map((r) => 1e3 * r);
    const scale = (si) => si * quantity.factor + quantity.offset;
    let [low, high] = [scale(quantity.least), scale(quantity.largest)];
    if (this.find("own-scale").checked) {
      const largest = this.shown.reduce((m, v) => Math.max(m, Math.abs(v)), 0);
      [low, high] = quantity.signed ? [-largest, largest] : [Math.min(low, largest), largest];
    }
    if (!(high > low)) high = low + 1;
    return {
      type: "heatmap", x: [...radii].reverse().map((r) => -r).concat(radii.slice(1)), y: this.edges().map((z) => 1e3 * z), z: rows, zmin: low, zmax: high, zsmooth: false,
      colorscale: quantity.colours.map((c, i) => [i / (quantity.colours.length - 1), c]), hoverinfo: "none",
      colorbar: { title: { text: withUnit(quantity), side: "right" }, thickness: 14, len: 0.7, outlinewidth: 0, exponentformat: "power" },
    };
  }

  edges() {
    return this.grid.z_edges.slice(this.instant.first, this.instant.first + this.instant.rows + 1);
  }

  fluxLines() {
    const columns = this.columns + 1;
    const start = (this.starts[this.index] + this.index) * columns;
    const rows = [];
    for (let j = 0; j <= this.instant.rows; j++) {
      const row = this.psi.subarray(start + j * columns, start + (j + 1) * columns);
      rows.push([...row].reverse().concat([...row].slice(1)));
    }
    const radii = this.grid.r_edges.map((r) => 1e3 * r);
    const step = this.about.flux_step;
    const count = 40;
    return {
      type: "contour", x: [...radii].reverse().map((r) => -r).concat(radii.slice(1)), y: this.edges().map((z) => 1e3 * z), z: rows, showscale: false, hoverinfo: "skip",
      autocontour: false, contours: { coloring: "none", start: -count * step, end: count * step, size: step }, line: { color: "#30343a", width: 0.8, smoothing: 1 },
    };
  }

  layout() {
    const layout = baseLayout({ x: { name: "Radius", unit: "mm", log: false }, y: { name: "Height", unit: "mm", log: false } });
    Object.assign(layout.xaxis, { constrain: "domain", zeroline: false });
    Object.assign(layout.yaxis, { scaleanchor: "x", scaleratio: 1, zeroline: false, constrain: "domain" });
    Object.assign(layout, { uirevision: "field", dragmode: "pan", margin: { l: 60, r: 10, t: 10, b: 46 }, showlegend: false });
    layout.yaxis.title = { text: "Height, mm", standoff: 8 };
    layout.shapes = this.outlines();
    return layout;
  }

  // Wall, mover and centre line, drawn over the colours.
  outlines() {
    const shapes = [{ type: "line", x0: 0, x1: 0, y0: 0, y1: 1, yref: "y domain", line: { color: INK, width: 1, dash: "dashdot" } }];
    const layout = this.about.layout;
    if (!layout) return shapes;
    const box = (inner, outer, low, high, line) => {
      for (const side of [1, -1]) {
        if (inner <= 0) {
          shapes.push({ type: "rect", x0: -500 * outer, x1: 500 * outer, y0: 1e3 * low, y1: 1e3 * high, line });
          return;
        }
        shapes.push({ type: "rect", x0: side * 500 * inner, x1: side * 500 * outer, y0: 1e3 * low, y1: 1e3 * high, line });
      }
    };
    const edges = this.edges();
    const [low, high] = [edges[0], edges[edges.length - 1]];
    for (const layer of layout.wall.layers) {
      const endless = layout.wall.length_m === null || layer.to_m <= layer.from_m;
      box(layer.inner_diameter_m, layer.outer_diameter_m, endless ? low : layer.from_m, endless ? high : layer.to_m, { color: INK, width: 1.5 });
    }
    for (const body of layout.mover) {
      if (body.outer_diameter_m <= 0) continue;
      const middle = this.instant.position + body.at_m;
      box(body.inner_diameter_m, body.outer_diameter_m, middle - body.length_m / 2, middle + body.length_m / 2, { color: INK, width: 1.5 });
    }
    return shapes;
  }

  // Shows the mover with some air, or all that is stored.
  fit(view) {
    const outer = 1.35 * this.about.outer * 1e3;
    const edges = this.edges();
    const around = [this.instant.position + this.about.body[0] - 1.6 * this.about.outer, this.instant.position + this.about.body[1] + 1.6 * this.about.outer];
    const heights = view === "mover" ? around : [edges[0], edges[edges.length - 1]];
    return Plotly.relayout(this.plot, { "xaxis.range": [-outer, outer], "yaxis.range": heights.map((z) => 1e3 * z) });
  }

  tellTime() {
    const { time, position } = this.instant;
    const count = this.about.instants.length;
    let text = `${digits(time, 5)} s, mover at ${digits(1e3 * position, 5)} mm (${this.index + 1} of ${count})`;
    if (this.about.settled) text = "settled";
    if (this.about.alternating) text = this.index === 0 ? "current at its peak" : "a quarter period later";
    this.find("time").textContent = text;
    this.find("instant").setAttribute("aria-valuetext", text);
  }

  hovered(event) {
    const point = event.points.find((p) => p.data.type === "heatmap");
    if (!point) return;
    const [row, across] = point.pointIndex || point.pointNumber;
    const left = across < this.columns;
    this.read(row, left ? this.columns - 1 - across : across - this.columns, left);
  }

  // Reads a cell of the shown instant: its place and every quantity in it.
  async read(row, column, left) {
    row = Math.max(0, Math.min(this.instant.rows - 1, row));
    column = Math.max(0, Math.min(this.columns - 1, column));
    this.cell = { row, column, left };
    const r = this.grid.r_centres[column];
    const z = this.grid.z_centres[this.instant.first + row];
    const start = (this.starts[this.index] + row) * this.columns + column;
    const out = this.find("reading");
    const lines = [`r ${digits(1e3 * r, 6)} mm, z ${digits(1e3 * z, 6)} mm`];
    for (const quantity of this.about.quantities) {
      const parts = await Promise.all(quantity.arrays.map((name) => this.array(name, 0)));
      const values = parts.map((p) => p[start] * quantity.factor + quantity.offset);
      const unit = behind(quantity.unit);
      if (values.length === 1) lines.push(`${quantity.name} ${digits(values[0], 6)}${unit}`);
      else lines.push(`${quantity.name} ${digits(Math.hypot(...values), 6)}${unit} (across ${digits(values[0], 6)}, along ${digits(values[1], 6)})`);
    }
    out.replaceChildren(...lines.flatMap((line, i) => (i === 0 ? [line] : [document.createElement("br"), line])));
    Object.assign(out.dataset, { instant: this.instant.index, row: this.grid.z_cells[this.instant.first + row], column: this.grid.r_cells[column] });
    for (const quantity of this.about.quantities) {
      for (const name of quantity.arrays) out.dataset[`value_${name}`] = (await this.array(name, 0))[start];
    }
    this.pointOut(left ? -r : r, z);
  }

  pointOut(r, z) {
    const shapes = this.outlines();
    shapes.push({ type: "circle", xsizemode: "pixel", ysizemode: "pixel", xanchor: 1e3 * r, yanchor: 1e3 * z, x0: -5, x1: 5, y0: -5, y1: 5, line: { color: "#d98a00", width: 2.5 } });
    Plotly.relayout(this.plot, { shapes });
  }

  // The cell that holds a place.
  readAt(r, z) {
    const within = (edges, x) => edges.findIndex((edge, i) => i + 1 < edges.length && x >= edge && x <= edges[i + 1]);
    const column = within(this.grid.r_edges, Math.abs(r));
    const row = within(this.edges(), z);
    if (column < 0 || row < 0) {
      this.find("reading").textContent = "Nothing is stored there at this instant.";
      return undefined;
    }
    return this.read(row, column, r < 0);
  }

  key(event) {
    const move = { ArrowUp: [1, 0], ArrowDown: [-1, 0], ArrowLeft: [0, -1], ArrowRight: [0, 1] }[event.key];
    if (move) {
      if (!this.cell) this.readAt(this.about.inner + 1e-9, this.instant.position);
      else this.read(this.cell.row + move[0], this.cell.column + move[1], this.cell.left);
    } else if (event.key === "+" || event.key === "-") zoom(this.plot, event.key === "+" ? 0.7 : 1 / 0.7);
    else if (event.key === "Escape") this.fit("all");
    else if (event.key === " ") this.play(this.timer === null);
    else return;
    event.preventDefault();
  }
}
