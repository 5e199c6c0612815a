import { nearestWord, suggestion } from '../harness/nearest-word.js';

/** What can be typed after `onebatch`. */
export interface Vocabulary {
  readonly commands: readonly string[];
  /** Options without their dashes. */
  readonly options: readonly string[];
}

/**
 * The parser's complaint about a command line as one line that says how to mend it.
 *
 * @param typed the words of the command line.
 */
export function explainUsage(complaint: string, typed: readonly string[], vocabulary: Vocabulary): string {
  const { commands, options } = vocabulary;
  const [first = '-'] = typed;
  if (!first.startsWith('-') && !commands.includes(first)) {
    return `there is no command "${first}"; ${suggestion(first, commands)}`;
  }
  const unknown = /^Unknown arguments?: ([^,]+)/.exec(complaint)?.[1];
  if (unknown !== undefined) {
    const near = nearestWord(unknown, options);
    const hint = near === undefined ? 'see onebatch --help' : `did you mean "--${near}"?`;
    return `unknown argument "${unknown}"; ${hint}`;
  }
  const valueless = /^Not enough arguments following: (.+)$/.exec(complaint)?.[1];
  if (valueless !== undefined) return `--${valueless} needs a value; see onebatch --help`;
  return complaint.replace(/\s+/g, ' ').trim();
}
