import { rootStream } from '../../harness/random.js';
import { Adam } from '../../methods/surrogates/network/adam.js';
import { startBackend } from '../../methods/surrogates/network/backend.js';
import { freshParameters, parameterArrays } from '../../methods/surrogates/network/parameters.js';
import { DeviceNetwork } from '../../methods/surrogates/network/passes.js';
import { medianMilliseconds, report } from './timing.js';

const inputs = 20;
const batch = 128;
const stepsPerRun = 50;

/** One training step (forward, backward, Adam) and one input gradient, two hidden layers, batch 128. */
export async function benchNetworks(): Promise<void> {
  await startBackend();
  const stream = rootStream(1);
  const rows = Float32Array.from({ length: batch * inputs }, () => stream.normal());
  const first = { step: 0, gradient: 0 };
  for (const width of [64, 128, 256]) {
    const parameters = freshParameters(inputs, [width, width], stream);
    const adam = new Adam(parameterArrays(parameters), { learningRate: 0.001, weightDecay: 0 });
    const step = () => {
      const device = new DeviceNetwork(parameters);
      adam.step(device.parameterGradients(rows, batch, (outputs) => outputs.map((o) => (2 / batch) * o)));
      device.dispose();
    };
    const gradient = () => {
      const device = new DeviceNetwork(parameters);
      device.inputGradients(rows, batch);
      device.dispose();
    };
    const stepTime = (await medianMilliseconds(5, () => repeat(step))) / stepsPerRun;
    const gradientTime = (await medianMilliseconds(5, () => repeat(gradient))) / stepsPerRun;
    first.step ||= stepTime;
    first.gradient ||= gradientTime;
    report(`training step, width ${width}, batch ${batch}`, stepTime, 'ms', stepTime / first.step);
    report(
      `input gradients, width ${width}, ${batch} designs`,
      gradientTime,
      'ms',
      gradientTime / first.gradient,
    );
  }
}

function repeat(work: () => void): void {
  for (let i = 0; i < stepsPerRun; i++) work();
}
