/** Writes a line for the person at the terminal: results to standard output. */
export function say(text: string): void {
  process.stdout.write(`${text}\n`);
}

/** Writes a line about how things go to standard error, so that piped results stay clean. */
export function remark(text: string): void {
  process.stderr.write(`${text}\n`);
}
