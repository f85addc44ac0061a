// Before the first paint, so that a chosen theme never flashes the other one. A file of its own: the page's
// content security policy runs no inline script.
(() => {
  try {
    const theme = globalThis.localStorage.getItem("borewright.theme");
    if (theme === "light" || theme === "dark") globalThis.document.documentElement.dataset.theme = theme;
  } catch {
    // Storage is barred: the theme follows the system.
  }
})();
