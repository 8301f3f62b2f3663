// Before the first paint, so that a dark room stays dark.
document.documentElement.dataset.theme = localStorage.getItem('foldwell theme') ?? 'light';
