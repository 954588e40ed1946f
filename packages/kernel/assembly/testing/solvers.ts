/** Exports for the solver tests only: chains from plain arrays. Never part of a released kernel. */
import { releaseAll, reserve } from "../arena";
import { put } from "../doubles";
import { countBelow } from "../solvers/band-inertia";
import { bandRadius, bandWindow } from "../solvers/band-levels";
import { BandMatrix, newBand, sealBand, setEntry } from "../solvers/band-matrix";
import { Chain, chainCounts, newChain, sealChain } from "../solvers/chain";
import { levelsByIndex } from "../solvers/chain-levels";
import { levelVectors } from "../solvers/chain-vectors";

export function testRelease(): void {
  releaseAll();
}
export function testReserve(bytes: u32): usize {
  return reserve(bytes);
}
export function testChain(n: i32, closed: i32, diagonal: usize, bonds: usize, theta: f64): usize {
  const chain = newChain(n, closed != 0);
  memory.copy(chain.diagonal, diagonal, <usize>n << 3);
  memory.copy(chain.bonds, bonds, <usize>n << 3);
  chain.cosine = Math.cos(theta);
  chain.sine = Math.sin(theta);
  sealChain(chain);
  return changetype<usize>(chain);
}
export function testCounts(chain: usize, shifts: usize, counts: usize): bool {
  return chainCounts(changetype<Chain>(chain), shifts, counts);
}
export function testLevels(chain: usize, first: i32, count: i32, guesses: usize, values: usize, errors: usize, vectors: usize, fresh: usize): bool {
  return levelsByIndex(changetype<Chain>(chain), first, count, guesses, values, errors, vectors, fresh);
}

export function testVectors(chain: usize, count: i32, values: usize, errors: usize, vectors: usize, fresh: usize, residuals: usize, cluster: usize): bool {
  return levelVectors(changetype<Chain>(chain), count, values, errors, vectors, fresh, residuals, cluster);
}
export function testBand(n: i32, width: i32): usize {
  return changetype<usize>(newBand(n, width));
}
export function testSetEntry(band: usize, row: i32, column: i32, re: f64, im: f64): void {
  setEntry(changetype<BandMatrix>(band), row, column, re, im);
}
export function testSealBand(band: usize): void {
  sealBand(changetype<BandMatrix>(band));
}
export function testBandCount(band: usize, x: f64): i32 {
  return countBelow(changetype<BandMatrix>(band), x, 1);
}
export function testBandWindow(band: usize, lower: f64, upper: f64, capacity: i32, values: usize, vectors: usize, residuals: usize): i32 {
  return bandWindow(changetype<BandMatrix>(band), lower, upper, capacity, values, vectors, residuals);
}
export function testBandRadius(band: usize, energy: f64, count: i32): f64 {
  return bandRadius(changetype<BandMatrix>(band), energy, count);
}
