import { parseString, writeToString } from 'fast-csv';

/** Records as CSV (RFC 4180 quoting, one line feed after each line). */
export function writeCsv(
  columns: readonly string[],
  records: readonly Readonly<Record<string, unknown>>[],
  options: { readonly header: boolean } = { header: true },
): Promise<string> {
  if (records.length === 0) return Promise.resolve(options.header ? `${columns.join(',')}\n` : '');
  const rows = records.map((record) => columns.map((column) => record[column] ?? ''));
  return writeToString(options.header ? [[...columns], ...rows] : rows, {
    headers: false,
    includeEndRowDelimiter: true,
  });
}

/** The lines of a CSV text as lists of values, its first line included; a first value of white space alone is empty. */
export function readCsv(text: string): Promise<string[][]> {
  return new Promise((resolve, reject) => {
    const rows: string[][] = [];
    parseString<string[], string[]>(text, { headers: false })
      .on('error', reject)
      .on('data', (row: string[]) => rows.push(row))
      .on('end', () => resolve(rows));
  });
}
