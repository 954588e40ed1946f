import type { Command } from '../lib/command.ts';
import { compute } from './compute.ts';
import { estimate } from './estimate.ts';
import { hash } from './hash.ts';
import { kernels } from './kernels.ts';
import { verify } from './verify.ts';

/** Every command, in the order of the overview. */
export const commands: readonly Command[] = [compute, verify, hash, estimate, kernels];
