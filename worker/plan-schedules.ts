import type { SiteScope } from '#server/actor.ts';
import { jobDefinitions } from '#server/jobs/job-definitions.ts';
import { prepareJob } from '#server/jobs/define-job.ts';
import type { JobDefinition } from '#server/jobs/define-job.ts';
import type { PlannedSchedule } from '#server/jobs/job-queue.ts';

/** Every schedule that is to stand: once for the company, or once for each site in its own zone. */
export function planSchedules(sites: readonly SiteScope[]): PlannedSchedule[] {
  const definitions: readonly JobDefinition[] = jobDefinitions;
  return definitions.flatMap((definition): PlannedSchedule[] => {
    const { name, schedule } = definition;
    if (schedule === null) {
      return [];
    }
    if (schedule.kind === 'every') {
      return [{ id: name, job: prepareJob(definition, {}, null), when: schedule }];
    }
    return sites.map((site) => ({
      id: `${name}-${site.code}`,
      job: prepareJob(definition, { siteId: site.id }, null),
      when: { ...schedule, zone: site.zone },
    }));
  });
}
