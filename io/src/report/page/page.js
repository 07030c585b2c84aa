// Draws what the page holds, and makes it ready for paper.

const described = JSON.parse(document.getElementById("charts").textContent);
const places = new Map([...document.querySelectorAll("[data-chart]")].map((p) => [p.dataset.chart, p]));

// A chart in a folded part is drawn when that opens: before it has no width.
function drawWhenOpen(chart) {
  const place = places.get(chart.id);
  const fold = place.closest("details:not([open])");
  if (!fold) return draw(place, chart);
  fold.addEventListener("toggle", () => draw(place, chart), { once: true });
  return Promise.resolve();
}

async function beginPlayer() {
  const root = document.getElementById("player");
  if (!root) return;
  const about = JSON.parse(document.getElementById("field-about").textContent);
  const data = new Map([...document.querySelectorAll(".field-data")].map((s) => [s.dataset.name, s.textContent]));
  const player = new Player(root, about, data);
  const course = described.find((c) => c.cursor && c.id.startsWith("drag-time"));
  if (course && about.instants.length > 1) await draw(document.getElementById("field-course"), course);
  else document.getElementById("field-course").remove();
  await player.begin();
}

const ready = Promise.all(described.map(drawWhenOpen)).then(beginPlayer);
ready.then(
  () => document.documentElement.setAttribute("data-ready", "yes"),
  (error) => {
    document.documentElement.setAttribute("data-ready", "failed");
    throw error;
  },
);

// Only tables that scroll are stops of the tab key.
function stops() {
  for (const wide of document.querySelectorAll(".wide")) wide.tabIndex = wide.scrollWidth > wide.clientWidth ? 0 : -1;
}
stops();
addEventListener("resize", stops);

// On paper every chart is as wide as the sheet lets it, and the resolved case is unfolded.
const SHEET = 680;
const MILLIMETRE = 96 / 25.4;
function onPaper(place) {
  if (place.id === "field-plot") return [0.58 * SHEET, 120];
  if (place.id === "field-course") return [0.38 * SHEET, 60];
  return place.closest(".pair") ? [SHEET / 2 - 12, 56] : [SHEET, 78];
}
addEventListener("beforeprint", () => {
  for (const fold of document.querySelectorAll("#record details")) fold.open = true;
  for (const place of document.querySelectorAll(".js-plotly-plot")) {
    const [width, height] = onPaper(place);
    Plotly.relayout(place, { width, height: height * MILLIMETRE, autosize: false });
  }
});
addEventListener("afterprint", () => {
  for (const place of document.querySelectorAll(".js-plotly-plot")) Plotly.relayout(place, { width: undefined, height: undefined, autosize: true });
});
