// The print button of a plan.
export function start(button) {
  button.addEventListener("click", () => window.print());
}
