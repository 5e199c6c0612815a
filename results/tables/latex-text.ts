import { oneLine } from './text-width.js';

const signs: Readonly<Record<string, string>> = {
  '\\': '\\textbackslash{}',
  '{': '\\{',
  '}': '\\}',
  $: '\\$',
  '&': '\\&',
  '#': '\\#',
  '%': '\\%',
  _: '\\_',
  '^': '\\textasciicircum{}',
  '~': '\\textasciitilde{}',
  '<': '\\textless{}',
  '>': '\\textgreater{}',
  '|': '\\textbar{}',
  '"': "{''}",
  "'": "{'}",
  '`': '{`}',
  '-': '{-}',
  '[': '{[}',
  ']': '{]}',
  '*': '{*}',
  '–': '--',
  '—': '---',
  '…': '\\dots{}',
  '·': '\\textperiodcentered{}',
  '±': '$\\pm$',
  '×': '$\\times$',
  '≤': '$\\le$',
  '≥': '$\\ge$',
  '°': '$^\\circ$',
  µ: '$\\mu$',
  ß: '\\ss{}',
  æ: '\\ae{}',
  Æ: '\\AE{}',
  ø: '\\o{}',
  Ø: '\\O{}',
  ł: '\\l{}',
  Ł: '\\L{}',
};

const accents: Readonly<Record<string, string>> = {
  '\u0300': '`',
  '\u0301': "'",
  '\u0302': '^',
  '\u0303': '~',
  '\u0304': '=',
  '\u0306': 'u',
  '\u0307': '.',
  '\u0308': '"',
  '\u030a': 'r',
  '\u030b': 'H',
  '\u030c': 'v',
  '\u0327': 'c',
};

/**
 * A text as LaTeX in plain ASCII: what LaTeX would read as markup is made literal, accents become commands, and a
 * character that pdflatex has no glyph for stands as its code point, such as [U+6750].
 */
export function escapeLatex(text: string): string {
  return Array.from(oneLine(text).normalize('NFC'), escapeCharacter).join('');
}

/** A number as text with a minus sign of its own, as in "$-$0.07". */
export function latexNumber(text: string): string {
  return escapeLatex(text).replaceAll('{-}', '$-$');
}

function escapeCharacter(character: string): string {
  const known = signs[character];
  if (known !== undefined) return known;
  if (/^[ -~]$/.test(character)) return character;
  const [base = '', mark = '', ...more] = character.normalize('NFD');
  const accent = accents[mark];
  if (accent !== undefined && more.length === 0 && /^[A-Za-z]$/.test(base)) {
    const dotless = (base === 'i' || base === 'j') && accent !== 'c' ? `\\${base}` : base;
    return `{\\${accent}{${dotless}}}`;
  }
  const code = character.codePointAt(0)!.toString(16).toUpperCase().padStart(4, '0');
  return `{[}U+${code}{]}`;
}
