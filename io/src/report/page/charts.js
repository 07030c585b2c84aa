// Charts: from the page's own description to the charting library's, with a reading by hover and by arrow keys.

const INK = "#1d2126";
const QUIET = "#565f69";
const RULE = "#e1e5ea";
const FONT = { family: "Arial, Helvetica, Liberation Sans, sans-serif", size: 13, color: INK };
// Told apart by lightness and by dashes too.
const COLOURS = ["#1f5a96", "#c25a10", "#2f8f6b", "#7a3f98", "#9a7b00", "#4d5863"];
const DASHES = ["solid", "dash", "dot", "dashdot", "longdash", "longdashdot"];
const OPTIONS = { displaylogo: false, responsive: true, scrollZoom: false, displayModeBar: "hover", modeBarButtons: [["toImage", "zoomIn2d", "zoomOut2d", "resetScale2d"]] };

const withUnit = (axis) => (axis.unit ? `${axis.name}, ${axis.unit}` : axis.name);
const digits = (value, count) => {
  if (!Number.isFinite(value)) return "–";
  const text = Number(value.toPrecision(count));
  const size = Math.abs(text);
  return (size !== 0 && (size < 1e-4 || size >= 1e7) ? text.toExponential() : String(text)).replace("-", "\u2212");
};
const behind = (unit) => (unit ? (unit === "°" ? unit : `\u00a0${unit}`) : "");
// What the library would take for mark-up of its own is shown as it is written.
const plain = (text) => text.replaceAll("&", "&amp;").replaceAll("<", "&lt;").replaceAll(">", "&gt;");

function axisOf(axis) {
  return {
    title: { text: plain(withUnit(axis)), standoff: 8 }, type: axis.log ? "log" : "linear", gridcolor: RULE, linecolor: QUIET, mirror: true, showline: true,
    ticks: "inside", tickcolor: QUIET, zeroline: !axis.log, zerolinecolor: "#9aa3ad", automargin: true, exponentformat: "power", minexponent: 4,
    ...(axis.log ? { tickformat: "~g", minor: { ticks: "inside", showgrid: false } } : {}),
  };
}

// The name of the upright axis stands level above it, where it has room and is read without turning the head.
function upName(axis) {
  return { text: plain(withUnit(axis)), xref: "paper", x: 0, xanchor: "left", yref: "paper", y: 1, yanchor: "bottom", yshift: 3, showarrow: false, font: { size: 14 } };
}

function baseLayout(chart) {
  const lines = (chart.lines || []).length;
  const legend = lines > 1 ? 24 + 20 * Math.ceil(lines / 4) : 0;
  return {
    font: FONT, paper_bgcolor: "#fff", plot_bgcolor: "#fff", margin: { l: 58, r: 16, t: 30, b: 48 + legend }, hovermode: "closest", dragmode: "zoom",
    hoverlabel: { bgcolor: "#fff", bordercolor: QUIET, font: FONT, align: "left", namelength: -1 },
    xaxis: axisOf(chart.x), yaxis: { ...axisOf(chart.y), title: undefined }, showlegend: lines > 1,
    legend: { orientation: "h", traceorder: "normal", x: 0, xanchor: "left", yref: "container", y: 0.01, yanchor: "bottom", bgcolor: "rgba(0,0,0,0)" },
  };
}

// The shaded band of a line: its upper edge, then its lower edge filled to it.
function bandTraces(line, colour) {
  const edge = (sign) => line.y.map((y, i) => y + sign * line.band[i]);
  const common = { x: line.x, mode: "lines", line: { width: 0 }, hoverinfo: "skip", showlegend: false };
  return [{ ...common, y: edge(1) }, { ...common, y: edge(-1), fill: "tonexty", fillcolor: colour + "33" }];
}

function lineTraces(chart) {
  const traces = [];
  chart.lines.forEach((line, k) => {
    const colour = COLOURS[k % COLOURS.length];
    const banded = line.band && line.band.length === line.y.length;
    if (banded && line.look !== "dots") traces.push(...bandTraces(line, colour));
    const broken = line.look === "broken";
    const mode = { line: "lines", points: "lines+markers", dots: "markers", broken: "lines" }[line.look];
    const name = plain(line.name);
    const head = chart.lines.length > 1 ? `<b>${name}</b><br>` : "";
    const half = banded ? ` ± %{customdata:.2~g}` : "";
    traces.push({
      x: line.x, y: line.y, name, mode, customdata: banded ? line.band : undefined, reading: true,
      line: { color: broken ? QUIET : colour, width: broken ? 1.5 : 2, dash: broken ? "dash" : DASHES[k % DASHES.length] },
      marker: { color: colour, size: line.look === "dots" ? 8 : 4, symbol: line.look === "dots" ? "diamond" : "circle" },
      error_y: banded && line.look === "dots" ? { type: "data", array: line.band, color: colour, thickness: 1 } : undefined,
      hovertemplate: `${head}${plain(chart.x.name)} %{x:.5~g}${behind(chart.x.unit)}<br>${plain(chart.y.name)} %{y:.7~g}${half}${behind(chart.y.unit)}<extra></extra>`,
    });
  });
  return traces;
}

function marksOf(chart) {
  const logged = (axis, value) => (axis.log ? Math.log10(value) : value);
  const notes = [];
  const shapes = [];
  const traces = [];
  for (const mark of chart.marks || []) {
    shapes.push({ type: "line", xref: "x", x0: mark.x, x1: mark.x, yref: "paper", y0: 0, y1: 1, line: { color: QUIET, width: 1, dash: "dot" } });
    const text = plain(mark.text);
    if (mark.y === undefined) {
      notes.push({ x: logged(chart.x, mark.x), xref: "x", y: 1, yref: "paper", text, textangle: -90, xanchor: "right", yanchor: "top", showarrow: false, font: { size: 12, color: QUIET } });
    } else {
      traces.push({ x: [mark.x], y: [mark.y], mode: "markers", marker: { symbol: "circle-open", size: 13, color: COLOURS[1], line: { width: 2 } }, hoverinfo: "skip", showlegend: false });
      notes.push({ x: logged(chart.x, mark.x), y: logged(chart.y, mark.y), text, ax: -50, ay: -24, xanchor: "right", arrowcolor: QUIET, font: { size: 12 }, bgcolor: "rgba(255,255,255,.85)" });
    }
  }
  return { notes, shapes, traces };
}

// Bars that begin where the one before them ends, the first at the top.
function barChart(chart) {
  const bars = [...chart.bars].reverse();
  const names = bars.map((b, i) => `${bars.length - i}. ${plain(b.name)}`);
  const colour = (b) => (b.whole ? COLOURS[0] : b.to >= b.from ? COLOURS[1] : COLOURS[2]);
  const trace = {
    type: "bar", orientation: "h", y: names, base: bars.map((b) => b.from), x: bars.map((b) => b.to - b.from), text: bars.map((b) => plain(b.text)),
    textposition: "outside", cliponaxis: false, marker: { color: bars.map(colour) }, reading: true, customdata: bars.map((b) => b.to),
    hovertemplate: `<b>%{y}</b><br>%{text}<br>to %{customdata:.5~g}${behind(chart.x.unit)}<extra></extra>`,
  };
  const layout = baseLayout(chart);
  const ends = chart.bars.flatMap((b) => [b.from, b.to, 0]);
  const [low, high] = [Math.min(...ends), Math.max(...ends)];
  layout.xaxis.range = [low - (low < 0 ? 0.18 : 0) * (high - low), high + 0.18 * (high - low)];
  layout.yaxis = { automargin: true, ticks: "", showline: true, linecolor: QUIET, mirror: true, tickfont: { size: 12 } };
  layout.margin.l = 10;
  return { traces: [trace], layout };
}

function draw(place, chart) {
  const { traces, layout } = chart.bars ? barChart(chart) : { traces: lineTraces(chart), layout: baseLayout(chart) };
  const marks = marksOf(chart);
  layout.shapes = marks.shapes;
  layout.annotations = chart.bars ? marks.notes : [upName(chart.y), ...marks.notes];
  traces.push(...marks.traces);
  return Plotly.newPlot(place, traces, layout, OPTIONS).then(() => {
    readByKeys(place, chart);
    if (chart.cursor) cursors.push({ place, chart });
  });
}

// Arrow keys walk along a line and say each point; up and down change lines, + and - zoom, Escape shows all.
function readByKeys(place, chart) {
  const said = place.parentElement.querySelector(".reading");
  let line = 0;
  let point = -1;
  const traces = () => place.data.map((t, i) => [t, i]).filter(([t]) => t.reading);
  const say = () => {
    const [trace, curve] = traces()[line];
    point = Math.max(0, Math.min(trace.x.length - 1, point));
    Plotly.Fx.hover(place, [{ curveNumber: curve, pointNumber: point }]);
    const half = trace.customdata && !chart.bars ? ` ± ${digits(trace.customdata[point], 2)}` : "";
    const name = traces().length > 1 ? `${trace.name}: ` : "";
    if (said) {
      said.textContent = chart.bars
        ? `${trace.y[point]}: ${trace.text[point]}`
        : `${name}${chart.x.name} ${digits(trace.x[point], 5)}${behind(chart.x.unit)}, ${chart.y.name} ${digits(trace.y[point], 7)}${half}${behind(chart.y.unit)}`;
    }
  };
  place.addEventListener("keydown", (event) => {
    const step = { ArrowRight: 1, ArrowLeft: -1, PageDown: 10, PageUp: -10, Home: -1e9, End: 1e9 }[event.key];
    const other = { ArrowUp: 1, ArrowDown: -1 }[event.key];
    if (step !== undefined) point += chart.bars ? -step : step;
    else if (other !== undefined && chart.bars) point += other;
    else if (other !== undefined) line = (line + other + traces().length) % traces().length;
    else if (event.key === "+" || event.key === "-") zoom(place, event.key === "+" ? 0.7 : 1 / 0.7);
    else if (event.key === "Escape") Plotly.relayout(place, { "xaxis.autorange": true, "yaxis.autorange": true });
    else return;
    event.preventDefault();
    if (step !== undefined || other !== undefined) say();
  });
}

function zoom(place, factor) {
  const change = {};
  for (const name of ["xaxis", "yaxis"]) {
    const [low, high] = place._fullLayout[name].range;
    const [middle, half] = [(low + high) / 2, ((high - low) / 2) * factor];
    change[`${name}.range`] = [middle - half, middle + half];
  }
  return Plotly.relayout(place, change);
}

// Charts over time show the instant that the field player shows.
const cursors = [];
function showInstant(seconds) {
  for (const { place, chart } of cursors) {
    const x = seconds * (chart.x.unit === "ms" ? 1e3 : chart.x.unit === "µs" ? 1e6 : 1);
    Plotly.relayout(place, { shapes: [{ type: "line", xref: "x", x0: x, x1: x, yref: "paper", y0: 0, y1: 1, line: { color: COLOURS[1], width: 2 } }] });
  }
}
