import { renderCsv } from './csv.js';
import { renderJson } from './json.js';
import { renderLatex } from './latex.js';
import { renderMarkdown } from './markdown.js';
import type { TableFormat } from './table-format.js';

/** The files in which a comparison is kept, in the order they are written. */
export const tableFormats: readonly TableFormat[] = [
  { name: 'csv', file: 'comparison.csv', render: renderCsv },
  { name: 'markdown', file: 'comparison.md', render: renderMarkdown },
  { name: 'json', file: 'comparison.json', render: renderJson },
  { name: 'latex', file: 'comparison.tex', render: renderLatex },
];
