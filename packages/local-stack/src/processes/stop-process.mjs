/**
 * Asks a process to end, then makes it end.
 * @param {{ pid: number, ended: Promise<unknown>, signal: NodeJS.Signals, withinMs: number }} process_
 */
export async function stopProcess({ pid, ended, signal, withinMs }) {
  send(pid, signal);
  /** @type {NodeJS.Timeout | undefined} */
  let timer;
  const late = new Promise((resolve) => { timer = setTimeout(() => resolve('late'), withinMs); });
  if ((await Promise.race([ended, late])) === 'late') {
    send(pid, 'SIGKILL');
    await ended;
  }
  clearTimeout(timer);
}

/** @param {number} pid @param {NodeJS.Signals} signal */
function send(pid, signal) {
  try {
    process.kill(pid, signal);
  } catch {
    // It has ended by itself.
  }
}
