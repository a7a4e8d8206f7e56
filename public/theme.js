/* Runs before the first paint: the cookie decides, else the system. Also serves every theme button. */
(function () {
  var root = document.documentElement;
  var cookie = /(?:^|; )theme=(linen|evening)/.exec(document.cookie);
  if (cookie) root.dataset.theme = cookie[1];
  else if (!root.dataset.theme)
    root.dataset.theme = matchMedia('(prefers-color-scheme: dark)').matches ? 'evening' : 'linen';
  document.addEventListener('click', function (event) {
    var target = event.target;
    if (!(target instanceof Element) || !target.closest('[data-theme-switch]')) return;
    var next = root.dataset.theme === 'evening' ? 'linen' : 'evening';
    root.dataset.theme = next;
    document.cookie =
      'theme=' +
      next +
      '; Path=/; Max-Age=31536000; SameSite=Lax' +
      (location.protocol === 'https:' ? '; Secure' : '');
    document.dispatchEvent(new CustomEvent('thrum:theme', { detail: next }));
  });
})();
