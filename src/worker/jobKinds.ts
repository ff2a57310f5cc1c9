/** Every kind of job that a worker can be asked for, by name. */
import { sweepJob, sweepSeedJob } from '../mechanics/gridSweepPlan.ts';
import type { JobKind } from '../mechanics/job.ts';
import { compareJob } from '../studies/compareRun.ts';
import { lastingJob } from '../studies/lastingRun.ts';
import { worstJob } from '../studies/worstRun.ts';

// biome-ignore lint/suspicious/noExplicitAny: kinds of different data share one list; a request and its kind are typed together
export const JOB_KINDS: readonly JobKind<any, any, any>[] = [sweepJob, sweepSeedJob, worstJob, compareJob, lastingJob];
