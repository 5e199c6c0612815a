import { renderCsv } from './csv.js';
import { renderJson } from './json.js';
import { renderMarkdown } from './markdown.js';
import type { TableFormat } from './table-format.js';

/** The files in which a comparison is kept, in the order they are written. */
export const tableFormats: readonly TableFormat[] = [
  { file: 'comparison.csv', render: renderCsv },
  { file: 'comparison.md', render: renderMarkdown },
  { file: 'comparison.json', render: renderJson },
];
