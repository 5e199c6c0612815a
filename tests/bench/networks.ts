import { execFileSync } from 'node:child_process';
import { fileURLToPath } from 'node:url';
import { zeros } from '../../harness/designs.js';
import { makeEncoding } from '../../harness/encoding.js';
import { rootStream, type Stream } from '../../harness/random.js';
import { makeSpace } from '../../harness/space.js';
import { takeKernel } from '../../methods/surrogates/kernel/kernel.js';
import { kernelNetworkOf } from '../../methods/surrogates/kernel/kernel-network.js';
import { arrange } from '../../methods/surrogates/kernel/kernel-parameters.js';
import { useEncoding, useNetworks } from '../../methods/surrogates/kernel/network-shape.js';
import { Adam } from '../../methods/surrogates/network/adam.js';
import { useBackend } from '../../methods/surrogates/network/backend.js';
import { freshParameters, parameterArrays } from '../../methods/surrogates/network/parameters.js';
import { DeviceNetwork } from '../../methods/surrogates/network/passes.js';
import { medianMilliseconds, report } from './timing.js';

const inputs = 20;
const batch = 128;
const widths = [64, 128, 256];
const stepsPerRun = 50;

interface Times {
  readonly step: number;
  readonly gradient: number;
}

/**
 * One training step (forward, backward, Adam) and the input gradients of as many designs; two hidden layers, 20 inputs,
 * batch 128: the kernel, torch where Python has it (Debian package python3-torch, with libopenblas0-pthread), and tfjs.
 */
export async function benchNetworks(): Promise<void> {
  const torch = timeTorch();
  if (torch === undefined) process.stdout.write('torch is not installed here: no ratio to it\n');
  for (const [k, width] of widths.entries()) {
    const kernel = await timeKernel(width);
    const tfjs = await timeTfjs(width);
    for (const part of ['step', 'gradient'] as const) {
      const what = part === 'step' ? 'training step' : 'input gradients';
      const reference = torch?.[k]?.[part];
      report(`${what}, width ${width}, batch ${batch}`, kernel[part], 'ms');
      if (reference !== undefined) {
        report('  torch; the kernel takes, of its time', reference, 'ms', kernel[part] / reference, 'x');
      }
      report('  tfjs on wasm; the same', tfjs[part], 'ms', kernel[part] / tfjs[part], 'x');
    }
  }
  await useBackend('kernel');
}

async function timeKernel(width: number): Promise<Times> {
  await useBackend('kernel');
  const stream = rootStream(1);
  const encoding = makeEncoding(
    makeSpace(
      Array.from({ length: inputs }, (_, j) => ({
        kind: 'continuous',
        name: `x${j + 1}`,
        low: 0,
        high: 1,
      })),
    ),
  );
  const parameters = freshParameters(inputs, [width, width], stream);
  const x = zeros(batch, inputs);
  for (let k = 0; k < x.values.length; k++) x.values[k] = stream.uniform();
  const network = kernelNetworkOf(encoding, parameters, { mean: 0, deviation: 1 });
  const gradientTime = await medianMilliseconds(9, () => repeat(() => network.predictWithGradient(x)));

  const kernel = takeKernel();
  const { call, arena } = kernel;
  useEncoding(kernel, encoding);
  const { shape, panels } = arrange(kernel, parameters);
  useNetworks(kernel, shape, panels, { rows: batch });
  const rows = arena.place(x.values);
  const targets = arena.place(Float64Array.from({ length: batch }, () => stream.normal()));
  const table = arena.reserve(call.tableBytes(rows, batch));
  const moments = arena.reserve(3 * call.parameterBytes(shape));
  const order = arena.place(Int32Array.from({ length: batch * stepsPerRun }, (_, i) => i % batch));
  const sizes = arena.place(new Int32Array(stepsPerRun).fill(batch));
  const losses = arena.reserve(8 * stepsPerRun);
  call.useConservatism(0, 0, 0, 0, 0, 0, 0);
  call.beginTraining(rows, batch, targets, table, moments, 0.001, 0);
  const stepTime = await medianMilliseconds(9, () => call.train(order, sizes, stepsPerRun, losses));
  return { step: stepTime / stepsPerRun, gradient: gradientTime / stepsPerRun };
}

async function timeTfjs(width: number): Promise<Times> {
  await useBackend('wasm');
  const stream: Stream = rootStream(1);
  const rows = Float32Array.from({ length: batch * inputs }, () => stream.normal());
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
  return {
    step: (await medianMilliseconds(3, () => repeat(step))) / stepsPerRun,
    gradient: (await medianMilliseconds(3, () => repeat(gradient))) / stepsPerRun,
  };
}

function timeTorch(): Times[] | undefined {
  const script = fileURLToPath(new URL('../../../tests/bench/networks_torch.py', import.meta.url));
  for (const python of ['python3', '/usr/bin/python3']) {
    try {
      const words = [script, inputs, batch, ...widths].map(String);
      const printed = execFileSync(python, words, { encoding: 'utf8', stdio: ['ignore', 'pipe', 'ignore'] });
      return (JSON.parse(printed) as [number, number][]).map(([step, gradient]) => ({ step, gradient }));
    } catch {
      // no such Python, or one without torch
    }
  }
  return undefined;
}

function repeat(work: () => unknown): void {
  for (let i = 0; i < stepsPerRun; i++) work();
}
