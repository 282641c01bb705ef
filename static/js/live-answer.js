// The answer follows the typing: asks the server a moment after the last key, and drops an older question.
const PAUSE_MS = 450;

export function start(form) {
  const line = form.querySelector("[data-live]");
  if (!line) return;
  let timer = 0;
  let asked = null;

  async function ask() {
    if (asked) asked.abort();
    asked = new AbortController();
    try {
      const response = await fetch("/store/answer", {
        method: "POST",
        body: new URLSearchParams(new FormData(form)),
        signal: asked.signal,
      });
      if (response.status === 503) {
        timer = setTimeout(ask, 2000);
        return;
      }
      line.textContent = await response.text();
    } catch (error) {
      if (error.name !== "AbortError") line.textContent = "No connection: the answer is not up to date.";
    }
  }

  form.addEventListener("input", () => {
    clearTimeout(timer);
    timer = setTimeout(ask, PAUSE_MS);
  });
  ask();
}
