/*
 * Sets the theme before anything is painted, so that no page flashes white. It is a blocking script of its own because the
 * content security policy allows none inside the page. src/app/theme.ts writes what is read here and takes over afterwards.
 */
(function setThemeEarly() {
  const page = globalThis.document.documentElement;
  let kept = {};
  try {
    kept = JSON.parse(globalThis.localStorage.getItem('quarterturn.appearance')) ?? {};
  } catch {
    // Storage may be closed or hold something older; the defaults serve.
  }
  let bench = globalThis.location.pathname.includes('/bench/runs/');
  try {
    bench ||= globalThis.sessionStorage.getItem('quarterturn.bench') === '1';
  } catch {
    // The address has to do.
  }
  const evening =
    kept.choice === 'evening' ||
    (kept.choice !== 'day' && globalThis.matchMedia('(prefers-color-scheme: dark)').matches);
  const darkRoom = bench && kept.benchTheme !== 'day';
  page.dataset.theme = darkRoom ? 'dark-room' : bench ? 'day' : evening ? 'evening' : 'day';
  page.dataset.lamp = kept.lamp === 'low' || kept.lamp === 'high' ? kept.lamp : 'mid';
  page.dataset.lampInk = kept.lampInk === 'red' ? 'red' : 'amber';
})();
