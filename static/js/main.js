// Finds the parts of a page that ask for behaviour and starts it; a page without scripts works as it is.
const behaviours = {
  "live-answer": () => import("./live-answer.js"),
  "read-out": () => import("./read-out.js"),
  resubmit: () => import("./resubmit.js"),
  "focus-first": () => import("./focus-first.js"),
  "print-page": () => import("./print-page.js"),
};

document.documentElement.classList.add("script");
for (const root of document.querySelectorAll("[data-module]")) {
  const load = behaviours[root.dataset.module];
  if (load) load().then((module) => module.start(root));
}
