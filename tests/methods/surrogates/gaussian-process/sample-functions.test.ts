import { describe, expect, test } from 'vitest';
import { rowView } from '../../../../harness/designs.js';
import { rootStream } from '../../../../harness/random.js';
import { drawFunctions } from '../../../../methods/surrogates/gaussian-process/sample-functions.js';
import { referencePosterior, x, xTest } from './reference.js';

describe('drawFunctions(posterior, count, frequencies, stream)', () => {
  test('has the exact posterior mean and covariance up to Monte Carlo error, over fresh frequencies', () => {
    const posterior = referencePosterior();
    const batches = 60;
    const each = 100;
    const m = xTest.rows;
    const sums = new Float64Array(m);
    const products = new Float64Array(m * m);
    const mean = posterior.mean(xTest);
    for (let b = 0; b < batches; b++) {
      const { values } = drawFunctions(posterior, each, 64, rootStream(b)).values(xTest);
      for (let k = 0; k < each; k++) {
        for (let i = 0; i < m; i++) {
          const deviation = values[i * each + k]! - mean[i]!;
          sums[i]! += deviation;
          for (let j = 0; j < m; j++) products[i * m + j]! += deviation * (values[j * each + k]! - mean[j]!);
        }
      }
    }
    const draws = batches * each;
    const tracked = posterior.track(xTest);
    for (let i = 0; i < m; i++) {
      const covariances = posterior.covariances(tracked, rowView(xTest, i));
      const deviation = Math.sqrt(tracked.variance[i]!);
      expect(Math.abs(sums[i]! / draws) / deviation).toBeLessThan(4 / Math.sqrt(draws));
      for (let j = 0; j < m; j++) {
        // a covariance's standard error is at most √2 sd sd / √draws for normal draws; frequencies shared by 100 add some
        const scale = deviation * Math.sqrt(tracked.variance[j]!);
        const error = Math.abs(products[i * m + j]! / draws - covariances[j]!) / scale;
        expect(error, `covariance ${i}, ${j}`).toBeLessThan(0.12);
      }
    }
  });

  test('draws differ where little is known, and agree with the targets where there is no noise', () => {
    const posterior = referencePosterior(0, 1e-9);
    const functions = drawFunctions(posterior, 3, 128, rootStream(1));
    const atTable = functions.values(x);
    for (let i = 0; i < x.rows; i++) {
      for (let k = 0; k < 3; k++) expect(atTable.values[3 * i + k]).toBeCloseTo(posterior.targets[i]!, 3);
    }
    const elsewhere = rowView(functions.values(xTest), 2);
    expect(Math.abs(elsewhere[0]! - elsewhere[1]!)).toBeGreaterThan(0.01);
  });

  test('value(k, x) is column k of values(x), and gradient(k, x) agrees with central differences', () => {
    const functions = drawFunctions(referencePosterior(), 2, 32, rootStream(4));
    const all = functions.values(xTest);
    for (let k = 0; k < 2; k++) {
      functions.value(k, xTest).forEach((value, i) => {
        expect(value).toBeCloseTo(all.values[2 * i + k]!, 10);
      });
      const gradient = functions.gradient(k, xTest);
      const step = 1e-5;
      xTest.values.forEach((value, e) => {
        const row = Math.floor(e / xTest.columns);
        const at = (moved: number) =>
          functions.value(k, { ...xTest, values: xTest.values.with(e, moved) })[row]!;
        expect(gradient.values[e]).toBeCloseTo((at(value + step) - at(value - step)) / (2 * step), 5);
      });
    }
  });
});
