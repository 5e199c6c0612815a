const meanDecay: f64 = 0.9;
const squareDecay: f64 = 0.999;
const epsilon: f32 = 1e-8;

/** Powers of the decay rates that a run of steps has come to; kept as products, so that no power function is needed. */
let meanPower: f64 = 1;
let squarePower: f64 = 1;

/** Begins a new run of steps. */
export function beginAdam(): void {
  meanPower = 1;
  squarePower = 1;
}

/**
 * Adam (Kingma & Ba 2015, algorithm 1) with decoupled weight decay (Loshchilov & Hutter 2019, algorithm 2) on `bytes`
 * bytes of f32, a multiple of 32, in place.
 */
export function adamStep(
  targets: usize,
  means: usize,
  squares: usize,
  gradients: usize,
  bytes: usize,
  learningRate: f64,
  weightDecay: f64,
): void {
  meanPower *= meanDecay;
  squarePower *= squareDecay;
  const rate = f32x4.splat(<f32>(learningRate / (1 - meanPower)));
  const squareScale = f32x4.splat(<f32>(1 / (1 - squarePower)));
  const shrink = f32x4.splat(<f32>(1 - learningRate * weightDecay));
  const keepMean = f32x4.splat(<f32>meanDecay);
  const takeMean = f32x4.splat(<f32>(1 - meanDecay));
  const keepSquare = f32x4.splat(<f32>squareDecay);
  const takeSquare = f32x4.splat(<f32>(1 - squareDecay));
  const epsilons = f32x4.splat(epsilon);
  for (let at: usize = 0; at < bytes; at += 16) {
    const g = v128.load(gradients + at);
    const mean = f32x4.add(f32x4.mul(keepMean, v128.load(means + at)), f32x4.mul(takeMean, g));
    const square = f32x4.add(
      f32x4.mul(keepSquare, v128.load(squares + at)),
      f32x4.mul(takeSquare, f32x4.mul(g, g)),
    );
    v128.store(means + at, mean);
    v128.store(squares + at, square);
    const size = f32x4.add(f32x4.sqrt(f32x4.mul(square, squareScale)), epsilons);
    const moved = f32x4.div(f32x4.mul(rate, mean), size);
    v128.store(targets + at, f32x4.sub(f32x4.mul(shrink, v128.load(targets + at)), moved));
  }
}
