// Finds the parts of a page that ask for behaviour and starts it.
const behaviours = {
  "live-answer": () => import("./live-answer.js"),
  "read-out": () => import("./read-out.js"),
  resubmit: () => import("./resubmit.js"),
  "focus-first": () => import("./focus-first.js"),
  "print-page": () => import("./print-page.js"),
};

export function startAll(within) {
  for (const root of within.querySelectorAll("[data-module]")) {
    const load = behaviours[root.dataset.module];
    if (load) load().then((module) => module.start(root));
  }
}
