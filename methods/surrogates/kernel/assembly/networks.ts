import { entryBytes } from './lists';
import { eights, fours, hiddenLayers, layerBytes, parameterBytes, transposedOffset, widthOf } from './shape';
import { features, listing } from './space';
import { transposeWeights } from './transpose';
import { workspaceBytes } from './workspace';

/** The shape of the networks in use. */
export let shape: usize = 0;

/** How many networks of this shape; their parameters lie one after another. */
export let members: i32 = 0;

/** Slope of the hidden units below zero. */
export let slope: f32 = 0;

/** Scratch memory of the passes. */
export let work: usize = 0;

/** The most rows that the scratch memory holds at once. */
export let mostRows: i32 = 0;

/** Outputs of all members, f32, `mostRows` each. */
export let memberOutputs: usize = 0;

/** Share of each member in the gradient of a row, f64. */
export let memberShares: usize = 0;

/** Heads of the rows in the workspace where rows are lists, and room for lists of their own. */
export let heads: usize = 0;

export let lists: usize = 0;

/** Room for four rows or columns of any layer. */
export let tile: usize = 0;

/** Room for the first layer's biases as listed rows need them. */
export let firstBiases: usize = 0;

/** Gradients by inputs of all members, panel-wise f32. */
export let memberGradients: usize = 0;

/** Near the end of all addresses, where sums of sizes could run over it. */
const addressable: f64 = 3.8e9;

/** More bytes than there are addresses. */
const tooMuch: f64 = 4.3e9;

let parameters: usize = 0;
let transposed: usize = 0;

/** Bytes of scratch memory that `useNetworks` needs; also right where they are more than there can be. */
export function scratchBytes(shapeAt: usize, count: i32, rows: i32): f64 {
  const members = <f64>count;
  const inputs = <f64>widthOf(shapeAt, 0);
  let units = inputs;
  for (let l = 1; l <= hiddenLayers(shapeAt); l++) units += <f64>widthOf(shapeAt, l);
  const ofMember = <f64>transposedOffset(shapeAt, hiddenLayers(shapeAt) + 1) + 4 * inputs * <f64>rows;
  const rough = members * ofMember + 8 * (units + inputs) * <f64>rows;
  return rough < addressable ? <f64>layOut(shapeAt, count, fours(rows), 0) : max(rough, tooMuch);
}

/** Says which networks all further calls are about. */
export function useNetworks(
  shapeAt: usize,
  parametersAt: usize,
  count: i32,
  slopeBelow: f32,
  rows: i32,
  scratch: usize,
): void {
  shape = shapeAt;
  parameters = parametersAt;
  members = count;
  slope = slopeBelow;
  mostRows = fours(rows);
  layOut(shape, count, mostRows, scratch);
}

/** Puts all scratch memory one after another and returns where it ends; all parts are multiples of 16 bytes. */
function layOut(shapeAt: usize, count: i32, rows: i32, scratch: usize): usize {
  const each = <usize>count;
  transposed = scratch;
  memberOutputs = transposed + each * transposedOffset(shapeAt, hiddenLayers(shapeAt) + 1);
  memberGradients = memberOutputs + each * ((<usize>rows) << 2);
  memberShares = memberGradients + each * layerBytes(rows, widthOf(shapeAt, 0));
  firstBiases = memberShares + (((each + 1) & ~1) << 3);
  tile = firstBiases + layerBytes(1, widthOf(shapeAt, 1));
  heads = tile + ((<usize>max(rows, eights(widestLayer(shapeAt)))) << 4);
  lists = heads + (listing ? <usize>rows * entryBytes : 0);
  work = lists + (listing ? <usize>rows * <usize>features * entryBytes : 0);
  return work + workspaceBytes(shapeAt, rows);
}

function widestLayer(shapeAt: usize): i32 {
  let widest = 0;
  for (let l = 0; l <= hiddenLayers(shapeAt); l++) widest = max(widest, widthOf(shapeAt, l));
  return widest;
}

export function parametersOf(member: i32): usize {
  return parameters + <usize>member * parameterBytes(shape);
}

export function transposedOf(member: i32): usize {
  return transposed + <usize>member * transposedOffset(shape, hiddenLayers(shape) + 1);
}

/** Bytes of one member's gradients by inputs. */
export function gradientBytes(rows: i32): usize {
  return layerBytes(rows, widthOf(shape, 0));
}

/** Brings the transposed weights up to date: of all layers, or without the first where inputs need no gradient. */
export function transposeMembers(first: i32): void {
  for (let m = 0; m < members; m++) transposeWeights(shape, parametersOf(m), transposedOf(m), first);
}
