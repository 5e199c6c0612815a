import { describe, expect, test } from 'vitest';
import { lookUpMethod, lookUpTask } from '../../harness/catalogue.js';
import { scripted, slope, toyCatalogue } from './toy-catalogue.js';

describe('lookUpMethod', () => {
  test('finds a method by its name', () => {
    expect(lookUpMethod(toyCatalogue, 'scripted')).toBe(scripted);
  });

  test('makes a method of three parts', () => {
    const parts = { surrogate: 'ridge', search: 'genetic', caution: 'none' };
    expect(lookUpMethod(toyCatalogue, parts).name).toBe('ridge+genetic+none');
  });

  test('throws for a name that it does not hold', () => {
    expect(() => lookUpMethod(toyCatalogue, 'script')).toThrow(RangeError);
  });
});

describe('lookUpTask', () => {
  test('finds a task family by its name', () => {
    expect(lookUpTask(toyCatalogue, 'slope')).toBe(slope);
  });

  test('throws for a name that it does not hold', () => {
    expect(() => lookUpTask(toyCatalogue, 'slop')).toThrow('no task is named "slop"');
  });
});
