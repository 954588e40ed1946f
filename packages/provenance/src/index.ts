export * from './canonical.ts';
export * from './hash-comb.ts';
export * from './result-digest.ts';
export * from './sha256.ts';
export * from './short-hash.ts';
export * from './specification-hash.ts';
