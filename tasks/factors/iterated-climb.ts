import type { Stream } from '../../harness/random.js';
import { FactorState } from './factor-state.js';
import type { FactorSum } from './factor-sum.js';

/** Work, in table look-ups, of a search without guarantee: about a second. */
const climbWork = 12_000_000;

/** Kicks in a row, per site, that may bring nothing before the climb starts afresh. */
const patience = 20;

/** Gains no larger than this are taken for rounding. */
const smallestGain = 1e-12;

/**
 * A sequence with a large sum of factors, (sites), without any guarantee that none is larger.
 *
 * Iterated local search (Lourenço, Martin & Stützle 2003): from a random sequence, single sites take their best letter
 * until none gains; then a site and up to two that share a factor with it are changed at random and the climb goes on
 * from there, taken back when it ends lower. Where this brings nothing for long, it starts afresh. Ends after about
 * `work` table look-ups' worth, so that the result is fixed by the stream.
 */
export function climbFactors(sum: FactorSum, stream: Stream, work = climbWork): Float64Array {
  const state = new FactorState(sum);
  let best = { letters: state.letters.slice(), value: state.value };
  while (state.work < work) {
    state.randomize(stream);
    climb(state, sum.alphabet, Array.from(state.letters.keys()), stream);
    for (let idle = 0; idle < patience * sum.sites && state.work < work; idle++) {
      const before = state.value;
      if (!kickAndClimb(state, sum.alphabet, stream)) continue;
      if (state.value > before + smallestGain) idle = 0;
    }
    if (state.value > best.value) best = { letters: state.letters.slice(), value: state.value };
  }
  return Float64Array.from(best.letters);
}

interface Change {
  readonly site: number;
  readonly letter: number;
}

function kickAndClimb(state: FactorState, alphabet: number, stream: Stream): boolean {
  const before = state.value;
  const site = stream.below(state.letters.length);
  const near = state.neighbours[site]!;
  const kicked = [site];
  for (let k = 0; k < Math.min(2, near.length); k++) kicked.push(near[stream.below(near.length)]!);
  const undo: Change[] = [];
  const waiting = new Set(kicked);
  for (const each of kicked) {
    const letter = stream.below(alphabet);
    undo.push({ site: each, letter: state.letters[each]! });
    state.change(each, letter, state.gain(each, letter));
    for (const other of state.neighbours[each]!) waiting.add(other);
  }
  undo.push(...climb(state, alphabet, [...waiting], stream));
  if (state.value >= before) return true;
  for (const { site: changed, letter } of undo.reverse()) state.change(changed, letter, 0);
  state.value = before;
  return false;
}

/** Lets waiting sites, in random order, take their best letter until none gains; returns what the letters were. */
function climb(state: FactorState, alphabet: number, waiting: number[], stream: Stream): Change[] {
  const isWaiting = new Set(waiting);
  const changes: Change[] = [];
  while (waiting.length > 0) {
    const at = stream.below(waiting.length);
    const site = waiting[at]!;
    waiting[at] = waiting[waiting.length - 1]!;
    waiting.pop();
    isWaiting.delete(site);
    let best = { letter: -1, gain: smallestGain };
    for (let letter = 0; letter < alphabet; letter++) {
      if (letter === state.letters[site]) continue;
      const gain = state.gain(site, letter);
      if (gain > best.gain) best = { letter, gain };
    }
    if (best.letter < 0) continue;
    changes.push({ site, letter: state.letters[site]! });
    state.change(site, best.letter, best.gain);
    for (const other of state.neighbours[site]!) {
      if (isWaiting.has(other)) continue;
      isWaiting.add(other);
      waiting.push(other);
    }
  }
  return changes;
}
