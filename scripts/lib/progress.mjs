const isTerminal = Boolean(process.stdout.isTTY);
const heartbeatMs = 10_000;

const seconds = (startedAt) => `${((Date.now() - startedAt) / 1000).toFixed(1)} s`;

/** The last line of a command's output worth showing. Addresses are left out: the first one shown must be the app's. */
function showable(line) {
  const text = line.replace(/\x1b\[[0-9;]*[A-Za-z]/g, '').trim();
  return /:\/\/|^\s*$/.test(text) ? '' : text.slice(0, 70);
}

/**
 * Runs one long step and shows that it moves: in a terminal a line that is rewritten, elsewhere a line every ten
 * seconds. `work` gets a function to which it hands output lines; what it returns is what `step` resolves to.
 */
export async function step(title, work) {
  const startedAt = Date.now();
  let latest = '';
  const draw = () => {
    const line = `… ${title} (${seconds(startedAt)})${latest ? ` ${latest}` : ''}`;
    if (isTerminal) process.stdout.write(`\r\x1b[K${line.slice(0, (process.stdout.columns ?? 80) - 1)}`);
    else console.log(line);
  };
  if (isTerminal) draw();
  const timer = setInterval(draw, isTerminal ? 250 : heartbeatMs);
  try {
    const result = await work((line) => {
      latest = showable(line) || latest;
    });
    finish('✓');
    return result;
  } catch (error) {
    finish('✗');
    throw error;
  }

  function finish(mark) {
    clearInterval(timer);
    console.log(`${isTerminal ? '\r\x1b[K' : ''}${mark} ${title} (${seconds(startedAt)})`);
  }
}
