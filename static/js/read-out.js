// Reads the chart at one time: by a slider for keyboard and touch, and by the pointer over the chart.
const STEPS = 384;

export function start(figure) {
  const charts = [...figure.querySelectorAll("svg.chart")];
  if (charts.length === 0) return;
  const end = Number(charts[0].dataset.end);
  const slider = document.createElement("input");
  const label = document.createElement("label");
  const output = document.createElement("output");
  Object.assign(slider, { type: "range", min: 0, max: end, step: end / STEPS, value: 0, id: "read-out" });
  Object.assign(label, { htmlFor: slider.id, textContent: "Read the chart at one time: hours since power loss" });
  label.className = "read-out__label";
  slider.className = "read-out__slider";
  output.className = "read-out__values";
  figure.querySelector("figcaption").before(label, slider, output);

  const lines = [...charts[0].querySelectorAll("[data-name]")].map((line) => ({
    name: line.dataset.name,
    points: [...line.points].map((point) => [point.x, point.y]),
  }));

  function value(points, x) {
    const next = Math.max(points.findIndex((point) => point[0] >= x), 1);
    const [x0, y0] = points[next - 1];
    const [x1, y1] = points[next];
    return y0 + ((y1 - y0) * (x - x0)) / (x1 - x0 || 1);
  }

  function show(hours) {
    const share = hours / end;
    for (const chart of charts) {
      const { left, right } = chart.dataset;
      const x = Number(left) + share * (right - left);
      const cursor = chart.querySelector(".chart__cursor");
      cursor.setAttribute("x1", x);
      cursor.setAttribute("x2", x);
      cursor.setAttribute("visibility", "visible");
    }
    const { left, right, top, bottom, low, high } = charts[0].dataset;
    const x = Number(left) + share * (right - left);
    const texts = lines.map(({ name, points }) => {
      const celsius = Number(high) - ((value(points, x) - top) / (bottom - top)) * (high - low);
      return `${name} ${celsius.toFixed(1).replace("-", "\u2212")} °C`;
    });
    output.textContent = `After ${hours.toFixed(1)} h: ${texts.join(", ")}`;
    slider.setAttribute("aria-valuetext", output.textContent);
  }

  slider.addEventListener("input", () => show(Number(slider.value)));
  for (const chart of charts) {
    chart.addEventListener("pointermove", (event) => {
      const box = chart.getBoundingClientRect();
      const { left, right, width } = chart.dataset;
      const x = ((event.clientX - box.left) / box.width) * width;
      slider.value = Math.min(Math.max((x - left) / (right - left), 0), 1) * end;
      show(Number(slider.value));
    });
  }
}
