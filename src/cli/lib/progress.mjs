/**
 * Runs one step and shows that it is alive: on a terminal a line that counts seconds, elsewhere a line
 * at the start and then every 15 seconds. Quick steps leave no trace.
 */
export async function step(title, work) {
  const startedAt = Date.now();
  const terminal = process.stdout.isTTY === true;
  const seconds = () => Math.round((Date.now() - startedAt) / 1000);
  let shown = false;
  const show = () => {
    if (terminal) process.stdout.write(`\r${title} … ${seconds()} s `);
    else console.log(`${title} …${shown ? ` ${seconds()} s` : ''}`);
    shown = true;
  };
  const first = setTimeout(show, 700);
  const tick = setInterval(() => shown && show(), terminal ? 1000 : 15_000);
  let word = 'failed after';
  try {
    const result = await work();
    word = 'done in';
    return result;
  } finally {
    clearTimeout(first);
    clearInterval(tick);
    if (shown) console.log(`${terminal ? '\r' : ''}${title}: ${word} ${seconds()} s`);
  }
}
