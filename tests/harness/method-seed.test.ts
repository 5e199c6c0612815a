import { describe, expect, test } from 'vitest';
import { cellsOf } from '../../harness/cells.js';
import { OnebatchError } from '../../harness/errors.js';
import { methodStream, setStage } from '../../harness/stage.js';
import { toyCatalogue } from './toy-catalogue.js';
import { toyPlan } from './toy-plan.js';

const lines = ['pool: 40', 'batch: 4', 'seed: 3', 'tasks: [slope]', 'curtains: [{ thin: 9, noise: 0.2 }]'];

/** The first cell of the plan: what its method sees, and the stream it draws from. */
function firstCell(...more: string[]) {
  const plan = toyPlan(...lines, 'methods: [scripted]', ...more);
  const [cell] = cellsOf(plan);
  const { designs, scores, floor, top, bestVisible } = setStage(plan, cell!, toyCatalogue);
  return { plan, seen: { designs, scores, floor, top, bestVisible }, stream: methodStream(plan, cell!).path };
}

describe('methodSeed of a plan', () => {
  const plain = firstCell();

  test('gives methods another stream on the same instance, pool and noise', () => {
    const other = firstCell('methodSeed: 4');
    expect(other.seen).toEqual(plain.seen);
    expect(other.stream).not.toBe(plain.stream);
    expect(firstCell('methodSeed: 5').stream).not.toBe(other.stream);
  });

  test("changes no stream where it is the plan's seed", () => {
    expect(firstCell('methodSeed: 3').stream).toBe(plain.stream);
  });

  test('stands in the plan only where it is given, so that manifests of other plans stay as they are', () => {
    expect(plain.plan).not.toHaveProperty('methodSeed');
    expect(firstCell('methodSeed: 4').plan.methodSeed).toBe(4);
  });

  test('must be a whole number of at least 0', () => {
    expect(() => firstCell('methodSeed: -1')).toThrow(OnebatchError);
    expect(() => firstCell('methodSeed: 1.5')).toThrow(/methodSeed/);
  });
});
