import { describe, expect, test } from 'vitest';
import { explainUsage } from '../../cli/usage.js';

const vocabulary = { commands: ['rehearse', 'list'], options: ['out', 'workers', 'seeds'] };
const explain = (complaint: string, ...typed: string[]) => explainUsage(complaint, typed, vocabulary);

// The complaints are those of yargs 18, in its English words.
describe('explainUsage', () => {
  test('names the nearest command for one that there is not', () => {
    expect(explain('Unknown argument: rehears', 'rehears')).toBe(
      'there is no command "rehears"; did you mean "rehearse"? There is: rehearse, list',
    );
    expect(explain('Unknown arguments: x, harvest', 'harvest', '-x')).toBe(
      'there is no command "harvest"; there is: rehearse, list',
    );
  });

  test('names the nearest option for one that there is not', () => {
    expect(explain('Unknown argument: sedes', 'rehearse', '--sedes', '3')).toBe(
      'unknown argument "sedes"; did you mean "--seeds"?',
    );
  });

  test('points to the help where no option is near', () => {
    expect(explain('Unknown arguments: b.yaml, c.yaml', 'rehearse', 'a.yaml', 'b.yaml', 'c.yaml')).toBe(
      'unknown argument "b.yaml"; see onebatch --help',
    );
  });

  test('asks for the value that an option lacks', () => {
    expect(explain('Not enough arguments following: out', 'rehearse', '--out')).toBe(
      '--out needs a value; see onebatch --help',
    );
  });

  test('puts any other complaint on one line', () => {
    expect(explain('name a command;\n  see onebatch --help')).toBe('name a command; see onebatch --help');
  });
});
