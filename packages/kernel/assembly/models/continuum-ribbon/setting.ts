/** What the points of a slice share: grids, chains, and the last point's levels as guesses for the next. */
import { reserve, reserveF64 } from "../../arena";
import { at, put } from "../../doubles";
import { Chain } from "../../solvers/chain";
import { chainOf, Grid, makeGrid, siteCount } from "./grid";
import { cells, gridCount, spinShift, valleySign } from "./parameters";

/** The grids and chains of one valley and spin, shared by the points of a slice. */
@unmanaged
export class Setting {
  row: i32;
  valley: f64;
  grids: usize; // up to three Grid addresses, u32
  chains: usize;
  /** Radius that held the nearest levels at the last point. */
  radius: f64;
  /** Levels and slopes of the last point per grid, by signed index: guesses for the next one. */
  lastK: f64;
  lastFirst: i32;
  lastCount: i32;
  lastCapacity: i32;
  lastLevels: usize;
  lastSlopes: usize;
}

export function newSetting(valleyRow: i32, spinRow: i32): Setting {
  const setting = changetype<Setting>(reserve(offsetof<Setting>()));
  setting.row = valleyRow;
  setting.valley = valleySign(valleyRow);
  setting.grids = reserve(16);
  setting.chains = reserve(16);
  setting.radius = 0;
  setting.lastCount = 0;
  setting.lastCapacity = siteCount(cells);
  setting.lastLevels = reserveF64(3 * <u64>setting.lastCapacity);
  setting.lastSlopes = reserveF64(3 * <u64>setting.lastCapacity);
  for (let g = 0; g < gridCount; g++) {
    const grid = makeGrid(cells << g, setting.valley, spinShift(spinRow));
    store<u32>(setting.grids + (<usize>g << 2), <u32>changetype<usize>(grid));
    store<u32>(setting.chains + (<usize>g << 2), <u32>changetype<usize>(chainOf(grid)));
  }
  return setting;
}

@inline
export function gridAt(setting: Setting, g: i32): Grid {
  return changetype<Grid>(<usize>load<u32>(setting.grids + (<usize>g << 2)));
}
@inline
export function chainAt(setting: Setting, g: i32): Chain {
  return changetype<Chain>(<usize>load<u32>(setting.chains + (<usize>g << 2)));
}
/** The finest grid and its chain, left filled by the last solve. */
export function finest(setting: Setting): Grid {
  return gridAt(setting, gridCount - 1);
}
export function finestChain(setting: Setting): Chain {
  return chainAt(setting, gridCount - 1);
}

/**
 * Where the levels of grid g should lie: along the last point's slope, and off it by as much as the coarser grid was;
 * without a last point, on the third grid, by the second-order law of the first two. False: no guess.
 */
export function guessLevels(setting: Setting, g: i32, k: f64, first: i32, count: i32, levels: usize, guesses: usize): bool {
  const row = <usize>count << 3;
  const known = setting.lastCount > 0 && first >= setting.lastFirst && first + count <= setting.lastFirst + setting.lastCount;
  if (!known) {
    if (g != 2) return false;
    for (let i = 0; i < count; i++) {
      const second = at(levels + row, i);
      put(guesses, i, second + 0.25 * (second - at(levels, i)));
    }
    return true;
  }
  const skip = first - setting.lastFirst;
  for (let i = 0; i < count; i++) {
    let guess = along(setting, g, skip + i, k);
    if (g > 0) guess += at(levels + <usize>(g - 1) * row, i) - along(setting, g - 1, skip + i, k);
    put(guesses, i, guess);
  }
  return true;
}

@inline
function along(setting: Setting, g: i32, i: i32, k: f64): f64 {
  const offset = <usize>g * <usize>setting.lastCapacity * 8;
  return at(setting.lastLevels + offset, i) + at(setting.lastSlopes + offset, i) * (k - setting.lastK);
}

export function remember(setting: Setting, k: f64, first: i32, count: i32, levels: usize, slopes: usize): void {
  setting.lastK = k;
  setting.lastFirst = first;
  setting.lastCount = min(count, setting.lastCapacity);
  const bytes = <usize>setting.lastCount << 3;
  for (let g = 0; g < gridCount; g++) {
    const offset = <usize>g * <usize>setting.lastCapacity * 8;
    memory.copy(setting.lastLevels + offset, levels + <usize>g * <usize>count * 8, bytes);
    memory.copy(setting.lastSlopes + offset, slopes + <usize>g * <usize>count * 8, bytes);
  }
}
