import type { PreparedJob } from '#server/jobs/define-job.ts';
import type { JobQueue } from '#server/jobs/job-queue.ts';

/** A queue that only remembers: one job per id, as the real one. It can be told to fail. */
export function createMemoryJobQueue() {
  const jobs = new Map<string, PreparedJob>();
  const failures: ('before' | 'after')[] = [];
  let addCount = 0;
  const queue: JobQueue = {
    add(added) {
      const failure = failures.shift();
      if (failure !== 'before') {
        addCount += added.length;
        for (const job of added) {
          const id = job.jobId ?? `unnamed-${addCount}`;
          jobs.set(id, jobs.get(id) ?? job);
        }
      }
      return failure === undefined
        ? Promise.resolve()
        : Promise.reject(new Error('the queue is down'));
    },
    plan: () => Promise.resolve(),
    close: () => Promise.resolve(),
  };
  return {
    ...queue,
    jobs: () => [...jobs.values()],
    /** How many jobs were handed in, repeats included. */
    addCount: () => addCount,
    /** The next `add` fails, before or after it has taken the jobs. */
    failNext: (when: 'before' | 'after') => {
      failures.push(when);
    },
  };
}
