import type { Command } from '../lib/command.ts';
import { compute } from './compute.ts';
import { estimate } from './estimate.ts';
import { fetchResult } from './fetch.ts';
import { follow } from './follow.ts';
import { hash } from './hash.ts';
import { kernels } from './kernels.ts';
import { login } from './login.ts';
import { reproduce } from './reproduce.ts';
import { submit } from './submit.ts';
import { verify } from './verify.ts';

/** Every command, in the order of the overview: without network first. */
export const commands: readonly Command[] = [
  compute,
  verify,
  hash,
  estimate,
  kernels,
  login,
  submit,
  follow,
  fetchResult,
  reproduce,
];
