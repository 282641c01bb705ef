// A page without scripts works as it is; this adds the comfort.
import { startAll } from "./modules.js";

document.documentElement.classList.add("script");
startAll(document);
