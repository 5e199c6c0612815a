const graphemes = new Intl.Segmenter('en', { granularity: 'grapheme' });

/** Text of which every character takes one column: no need to look further. */
const plain = /^[ -~–…─·]*$/;

/** Scripts and signs that terminals draw two columns wide (Unicode Annex 11, wide and full width). */
const wide =
  /^[\u1100-\u115f\u2e80-\u303e\u3041-\ua4cf\ua960-\ua97c\uac00-\ud7a3\uf900-\ufaff\ufe30-\ufe6f\uff01-\uff60\uffe0-\uffe6\u{1b000}-\u{1b2ff}\u{20000}-\u{3fffd}]|\p{Emoji_Presentation}|\ufe0f/u;

/** What takes no place, or breaks the line: control and format characters, separators, lone surrogates and marks. */
const unprintable = /[\p{Cc}\p{Cf}\p{Zl}\p{Zp}\p{Cs}]+/gu;

/** A label made fit for one line of a terminal or file: each run of control characters becomes one space. */
export function oneLine(text: string): string {
  return text.replace(unprintable, ' ');
}

/** How many columns a line of text takes in a terminal. */
export function textWidth(text: string): number {
  if (plain.test(text)) return text.length;
  let width = 0;
  for (const { segment } of graphemes.segment(text)) width += graphemeWidth(segment);
  return width;
}

/** The text, or as much of it as fits `width` columns with an ellipsis at its end. */
export function truncateText(text: string, width: number): string {
  if (textWidth(text) <= width) return text;
  let kept = '';
  let used = 1;
  for (const { segment } of graphemes.segment(text)) {
    used += graphemeWidth(segment);
    if (used > width) break;
    kept += segment;
  }
  return `${kept.trimEnd()}…`;
}

/** The text with spaces after it, up to `width` columns. */
export function padTextEnd(text: string, width: number): string {
  return text + ' '.repeat(Math.max(0, width - textWidth(text)));
}

/** The text with spaces before it, up to `width` columns. */
export function padTextStart(text: string, width: number): string {
  return ' '.repeat(Math.max(0, width - textWidth(text))) + text;
}

/** Breaks a text at spaces into lines of at most `width` columns; every line but the first starts with `indent`. */
export function wrapText(text: string, width: number, indent = ''): string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of text.split(' ')) {
    const longer = line === '' ? word : `${line} ${word}`;
    if (line !== '' && textWidth(longer) > width) {
      lines.push(line);
      line = indent + word;
    } else line = longer;
    line = truncateText(line, width);
  }
  return [...lines, line];
}

function graphemeWidth(grapheme: string): number {
  return wide.test(grapheme) ? 2 : 1;
}
