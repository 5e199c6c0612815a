import { XMLParser, XMLValidator } from 'fast-xml-parser';
import { describe, expect, test } from 'vitest';
import { escapeXml, type JunitCase, writeJunit } from '../../results/junit.js';

const passed: JunitCase = {
  name: 'a <b> & "c"',
  className: 'x',
  result: 'passed',
  message: "it's fine",
  kind: 'ok',
};
const suites = [
  {
    name: 'one & only',
    properties: { 'a "key"': '<value>' },
    cases: [
      passed,
      { ...passed, name: 'lost', result: 'failed', message: 'line\nbreak\tand \u0000\u0008 controls' },
      { ...passed, name: 'unknown', result: 'skipped' },
    ],
  },
  { name: 'two', properties: {}, cases: [{ ...passed, name: 'broken', result: 'error' }] },
] as const;

describe('writeJunit(name, suites)', () => {
  const xml = writeJunit('guard', suites);
  // Attributes as the XML recommendation (W3C 1998) has them; the form of the report is that which build servers read.
  const read = new XMLParser({ ignoreAttributes: false, attributeNamePrefix: '' }).parse(xml) as {
    testsuites: {
      tests: string;
      failures: string;
      errors: string;
      skipped: string;
      testsuite: { name: string }[];
    };
  };

  test('is well formed, whatever the texts hold', () => {
    expect(XMLValidator.validate(xml)).toBe(true);
  });

  test('counts tests, failures, errors and skipped ones', () => {
    expect(read.testsuites).toMatchObject({ tests: '4', failures: '1', errors: '1', skipped: '1' });
    expect(read.testsuites.testsuite.map(({ name }) => name)).toEqual(['one & only', 'two']);
  });
});

test.each([
  ['<&>"\'', '&lt;&amp;&gt;&quot;&apos;'],
  ['a\tb\nc\rd', 'a&#9;b&#10;c&#13;d'],
  ['\u0000\u0008\ud800', '\ufffd\ufffd\ufffd'],
  ['µ 材 😀', 'µ 材 😀'],
])('escapeXml(%j) is %j', (text, escaped) => {
  expect(escapeXml(text)).toBe(escaped);
});
