/** One checked subject of a suite. */
export interface JunitCase {
  readonly name: string;
  readonly className: string;
  readonly result: 'passed' | 'failed' | 'skipped' | 'error';
  /** One line: why it failed or was skipped; for one that passed what was found. */
  readonly message: string;
  /** A word for the kind of failure. */
  readonly kind: string;
}

/** Cases that belong together, with facts that hold for all of them. */
export interface JunitSuite {
  readonly name: string;
  readonly properties: Readonly<Record<string, string>>;
  readonly cases: readonly JunitCase[];
}

/**
 * A report in the XML form that build servers read as JUnit's: `testsuites` of `testsuite` with `properties`, and each
 * `testcase` with `failure`, `error` or `skipped`, and its message in `system-out`. Times are 0: nothing is timed.
 */
export function writeJunit(name: string, suites: readonly JunitSuite[]): string {
  const lines = [
    '<?xml version="1.0" encoding="UTF-8"?>',
    `<testsuites ${attributes({ name, ...countsOf(suites.flatMap(({ cases }) => cases)), time: '0' })}>`,
    ...suites.flatMap(writeSuite),
    '</testsuites>',
  ];
  return `${lines.join('\n')}\n`;
}

function writeSuite({ name, properties, cases }: JunitSuite): string[] {
  const facts = Object.entries(properties).map(([key, value]) => {
    return `      <property ${attributes({ name: key, value })}/>`;
  });
  return [
    `  <testsuite ${attributes({ name, ...countsOf(cases), time: '0' })}>`,
    ...(facts.length > 0 ? ['    <properties>', ...facts, '    </properties>'] : []),
    ...cases.flatMap(writeCase),
    '  </testsuite>',
  ];
}

function writeCase({ name, className, result, message, kind }: JunitCase): string[] {
  const head = `    <testcase ${attributes({ name, classname: className, time: '0' })}>`;
  const why = attributes({ message, type: kind });
  const inside = {
    passed: [],
    failed: [`      <failure ${why}>${escapeXml(message)}</failure>`],
    error: [`      <error ${why}>${escapeXml(message)}</error>`],
    skipped: [`      <skipped ${attributes({ message })}/>`],
  }[result];
  return [head, ...inside, `      <system-out>${escapeXml(message)}</system-out>`, '    </testcase>'];
}

function countsOf(cases: readonly JunitCase[]): Record<string, string> {
  const count = (result: JunitCase['result']) => String(cases.filter((one) => one.result === result).length);
  return {
    tests: String(cases.length),
    failures: count('failed'),
    errors: count('error'),
    skipped: count('skipped'),
  };
}

function attributes(values: Readonly<Record<string, string>>): string {
  return Object.entries(values)
    .map(([key, value]) => `${key}="${escapeXml(value)}"`)
    .join(' ');
}

const entities: Readonly<Record<string, string>> = {
  '&': '&amp;',
  '<': '&lt;',
  '>': '&gt;',
  '"': '&quot;',
  "'": '&apos;',
  '\t': '&#9;',
  '\n': '&#10;',
  '\r': '&#13;',
};

/** Text for XML 1.0, in quotes or between tags; characters that XML can't hold become U+FFFD. */
export function escapeXml(text: string): string {
  return text
    .replace(/[^\t\n\r\u{20}-\u{D7FF}\u{E000}-\u{FFFD}\u{10000}-\u{10FFFF}]/gu, '\u{FFFD}')
    .replace(/[&<>"'\t\n\r]/g, (character) => entities[character]!);
}
