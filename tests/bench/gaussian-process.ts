import { rootStream } from '../../harness/random.js';
import { makeSpace, sampleUniform } from '../../harness/space.js';
import { gaussianProcessSurrogate } from '../../methods/surrogates/gaussian-process.js';
import { makeTable } from '../../methods/table.js';
import { medianMilliseconds, report } from './timing.js';

const dimensions = 10;
const predicted = 2000;

/** Fit and prediction of the Gaussian process, 10 columns, all rows used. */
export async function benchGaussianProcess(): Promise<void> {
  const stream = rootStream(2);
  const space = makeSpace(
    Array.from({ length: dimensions }, (_, j) => ({
      kind: 'continuous',
      name: `x${j + 1}`,
      low: 0,
      high: 1,
    })),
  );
  const first = { fit: 0, predict: 0 };
  for (const rows of [250, 500, 1000]) {
    const table = tableOf(rows);
    const settings = gaussianProcessSurrogate.settings.parse({
      fitRows: rows,
      mostRows: rows,
      starts: 1,
      iterations: 5,
    });
    const asked = tableOf(predicted).x;
    const train = () => gaussianProcessSurrogate.fit(table, settings, stream.split('fit'));
    const model = await train();
    const fitTime = await medianMilliseconds(1, train);
    const predictTime = await medianMilliseconds(3, () => model.predict(asked).spread);
    first.fit ||= fitTime;
    first.predict ||= predictTime;
    report(`GP fit, n = ${rows}, 1 start of 5 steps`, fitTime, 'ms', fitTime / first.fit);
    report(
      `GP predict ${predicted} means and spreads, n = ${rows}`,
      predictTime,
      'ms',
      predictTime / first.predict,
    );
  }

  function tableOf(rows: number) {
    const designs = sampleUniform(space, rows, stream.split('rows', rows));
    const scores = Float64Array.from({ length: rows }, (_, i) => {
      const row = designs.values.subarray(i * dimensions, (i + 1) * dimensions);
      return row.reduce((sum, x, j) => sum + Math.sin((j + 1) * x), 0);
    });
    return makeTable({ space, designs, scores, batchSize: 1, stream, budgetSeconds: 60 });
  }
}
