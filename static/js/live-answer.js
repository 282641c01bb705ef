// The answer follows the typing: asks the server a moment after the last key, and drops an older question.
import { startAll } from "./modules.js";

const PAUSE_MS = 600;
const BUSY_MS = 2000;

export function start(form) {
  const line = form.querySelector("[data-live-line]");
  const figure = form.querySelector("[data-live-figure]");
  const answer = document.querySelector("#answer");
  if (!line || !figure || !answer) return;
  let timer = 0;
  let asked = null;

  function later(pause) {
    clearTimeout(timer);
    timer = setTimeout(ask, pause);
  }

  function show(html, isAnswered) {
    const page = new DOMParser().parseFromString(html, "text/html");
    line.textContent = page.querySelector("[data-live-line]")?.textContent ?? "The server did not answer as expected.";
    const fresh = isAnswered ? page.querySelector("[data-answer]") : null;
    answer.classList.toggle("is-old", !fresh);
    figure.textContent = "";
    if (!fresh) return;
    figure.textContent = page.querySelector("[data-live-figure]").textContent;
    answer.replaceChildren(...fresh.childNodes);
    startAll(answer);
  }

  async function ask() {
    if (asked) asked.abort();
    const mine = new AbortController();
    asked = mine;
    answer.classList.add("is-old");
    try {
      const body = new URLSearchParams(new FormData(form));
      const response = await fetch("/store/answer", { method: "POST", body, signal: mine.signal });
      if (response.status === 503) return later(BUSY_MS);
      const html = await response.text();
      if (asked === mine) show(html, response.ok);
    } catch (error) {
      if (error.name !== "AbortError") line.textContent = "No connection: the answer is of an earlier description.";
    }
  }

  form.addEventListener("input", () => later(PAUSE_MS));
  if ("askNow" in form.dataset) ask();
}
