// Read the chart by pointer, touch or arrow keys: a cursor, and the values beside the chart in words.
export function start(chart) {
  const data = JSON.parse(chart.dataset.readings);
  const cursor = chart.querySelector(".chart__cursor");
  const line = chart.closest("figure")?.querySelector("[data-read-out]");
  if (!cursor || !line || data.time_h.length === 0) return;
  let at = 0;

  function show(index) {
    at = Math.max(0, Math.min(data.time_h.length - 1, index));
    const x = data.left + ((data.right - data.left) * data.time_h[at]) / data.end_h;
    cursor.setAttribute("x1", x);
    cursor.setAttribute("x2", x);
    cursor.setAttribute("visibility", "visible");
    const values = data.names.map((name, k) => `${name} ${data.values[k][at].toFixed(1)} °C`);
    line.textContent = `${data.time_h[at].toFixed(2)} h: ${values.join(", ")}`;
  }

  function near(event) {
    const box = chart.getBoundingClientRect();
    const x = ((event.clientX - box.left) / box.width) * data.width;
    const hours = ((x - data.left) / (data.right - data.left)) * data.end_h;
    let best = 0;
    data.time_h.forEach((time, k) => {
      if (Math.abs(time - hours) < Math.abs(data.time_h[best] - hours)) best = k;
    });
    show(best);
  }

  chart.setAttribute("tabindex", "0");
  chart.addEventListener("pointermove", near);
  chart.addEventListener("pointerdown", near);
  chart.addEventListener("keydown", (event) => {
    const steps = { ArrowLeft: -1, ArrowRight: 1, PageDown: 10, PageUp: -10, Home: -1e9, End: 1e9 };
    if (!(event.key in steps)) return;
    event.preventDefault();
    show(at + steps[event.key]);
  });
}
