/** Benchmarks: each file of this folder prints its own lines. */
import { dutyLines } from './duty.ts';

for (const line of dutyLines()) console.log(line);
