// Faults take the focus when the page comes.
export function start(summary) {
  summary.focus();
}
