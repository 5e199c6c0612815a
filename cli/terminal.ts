/** Writes a line for the person at the terminal: results to standard output. */
export function say(text: string): void {
  process.stdout.write(`${text}\n`);
}

/** Writes a line about how things go to standard error, so that piped results stay clean. */
export function remark(text: string): void {
  process.stderr.write(`${text}\n`);
}

/** Whether standard output is a terminal that wants bold and dim text. */
export function inStyle(): boolean {
  return process.stdout.isTTY === true && !process.env['NO_COLOR'];
}

/**
 * Ends the program without a word when who reads its standard output has gone, as `onebatch list | head` does. Nobody
 * reading its remarks is no reason to end: a rehearsal goes on.
 */
export function endQuietlyWithoutReader(): void {
  process.stdout.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code !== 'EPIPE') throw error;
    process.exit();
  });
  process.stderr.on('error', (error: NodeJS.ErrnoException) => {
    if (error.code !== 'EPIPE') throw error;
  });
}
