// Runs before everything else, in words that every engine knows: puts the theme on before the first paint, and says so
// where the engine is too old for the screens. The floor is Chrome 108: container queries, :has, dialog.
(function () {
  var root = document.documentElement;
  var theme = null;
  try {
    theme = localStorage.getItem('dewledger-theme');
  } catch (_refused) {
    theme = null;
  }
  if (theme !== 'light' && theme !== 'dark' && theme !== 'contrast') {
    theme = 'light';
    if (window.matchMedia && matchMedia('(prefers-color-scheme: dark)').matches) theme = 'dark';
    if (window.matchMedia && matchMedia('(prefers-contrast: more)').matches) theme = 'contrast';
  }
  root.setAttribute('data-theme', theme);

  var enough =
    'noModule' in document.createElement('script') &&
    window.CSS &&
    CSS.supports &&
    CSS.supports('container-type: inline-size') &&
    CSS.supports('selector(:has(a))') &&
    typeof HTMLDialogElement === 'function';
  if (enough) return;

  document.addEventListener('DOMContentLoaded', function () {
    var place = document.getElementById('too-old');
    var found = /Chrome\/(\d+)/.exec(navigator.userAgent);
    var app = document.getElementById('app');
    if (app && app.parentNode) app.parentNode.removeChild(app);
    if (!place) return;
    place.removeAttribute('hidden');
    place.textContent =
      'These screens need a newer engine' +
      (found ? ' than version ' + found[1] : '') +
      '. Version 108 or newer will do. On a phone: update "Android System WebView" in the system settings, then ' +
      'open Dewledger again. Nothing that was filed is lost.';
  });
})();
