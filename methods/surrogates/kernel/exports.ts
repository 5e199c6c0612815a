/**
 * What the compiled kernel offers; the sources under `assembly/` say what each does. Addresses and counts are whole
 * numbers, addresses multiples of 16.
 */
export interface KernelExports {
  readonly memory: WebAssembly.Memory;
  firstAddress(): number;
  useSpace(width: number, blocks: number, count: number, shifts: number, factors: number): void;
  parameterBytes(shape: number): number;
  scratchBytes(shape: number, members: number, rows: number): number;
  useNetworks(
    shape: number,
    parameters: number,
    members: number,
    slope: number,
    rows: number,
    scratch: number,
  ): void;
  arrangeParameters(shape: number, plain: number, panels: number, back: number): void;
  transposeMembers(firstLayer: number): void;
  predict(x: number, rows: number, outputs: number): void;
  gradients(
    x: number,
    rows: number,
    outputs: number,
    gradient: number,
    spreadWeight: number,
    scale: number,
  ): void;
  ascend(
    x: number,
    rows: number,
    steps: number,
    rate: number,
    spreadWeight: number,
    gradient: number,
    trace: number,
    traceEvery: number,
  ): void;
  useConservatism(
    rows: number,
    steps: number,
    rate: number,
    weight: number,
    adjusted: number,
    target: number,
    scratch: number,
  ): void;
  tableBytes(x: number, rows: number): number;
  beginTraining(
    x: number,
    rows: number,
    targets: number,
    prepared: number,
    moments: number,
    learningRate: number,
    weightDecay: number,
  ): void;
  lossGradient(order: number, size: number): number;
  train(order: number, sizes: number, steps: number, losses: number): void;
}
