import type { z } from 'zod';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { notFound, problem, staleVersion } from '#server/problem.ts';
import type {
  PolicyDto,
  setWorkingHours as setWorkingHoursContract,
  WorkingHoursDto,
} from '#shared/contracts/settings.contract.ts';
import type { WorkingCalendar } from '#shared/domain/facility/types.ts';
import { judgePolicyValue } from '#shared/domain/policies/judge-policy-value.ts';
import { isPolicyKey, policyDefinitions } from '#shared/domain/policies/site-policy.ts';
import type { PolicyKey, PolicyValue, SitePolicy } from '#shared/domain/policies/site-policy.ts';
import { sitePolicyFrom } from '#shared/domain/policies/site-policy-from.ts';
import { presentPolicy, presentWorkingHours, toWorkingCalendar } from './settings.presenter.ts';
import {
  findSiteRow,
  getHoursRows,
  insertSetting,
  listSettingRows,
  listSiteRows,
  replaceExceptions,
  updateSetting,
  updateWeekHours,
} from './settings.repository.ts';

type Reading = Pick<Deps, 'db'>;
type Changing = Pick<Deps, 'clock' | 'db' | 'requestId' | 'transact'>;

export function findSiteByCode(deps: Reading, code: string): Promise<SiteScope | null> {
  return findSiteRow(deps.db, code);
}

export function listSites(deps: Reading): Promise<SiteScope[]> {
  return listSiteRows(deps.db);
}

/** The site's policy with its defaults filled in; for services of other features. */
export async function getSitePolicy(deps: Reading, siteId: number): Promise<SitePolicy> {
  return sitePolicyFrom(await listSettingRows(deps.db, siteId));
}

/** The site's working hours as the core reads them; for services of other features. */
export async function getWorkingCalendar(deps: Reading, siteId: number): Promise<WorkingCalendar> {
  return toWorkingCalendar(await getHoursRows(deps.db, siteId));
}

export async function listPolicies(deps: Reading, site: SiteScope): Promise<PolicyDto[]> {
  const rows = await listSettingRows(deps.db, site.id);
  const policy = sitePolicyFrom(rows);
  return Object.keys(policyDefinitions)
    .filter(isPolicyKey)
    .map((key) =>
      presentPolicy(
        key,
        policy,
        rows.find((row) => row.key === key),
      ),
    );
}

export async function setPolicy(
  deps: Changing,
  actor: SignedIn,
  site: SiteScope,
  change: { readonly key: string; readonly value: unknown; readonly version: number },
): Promise<PolicyDto> {
  const { key, version } = change;
  if (!isPolicyKey(key)) {
    throw notFound('such policy');
  }
  const value = requireFit(key, change.value);
  return deps.transact(async (tx) => {
    const before = await listSettingRows(tx, site.id);
    const row = { siteId: site.id, key, value, changedById: actor.personId, at: deps.clock.now() };
    const isSaved =
      version === 0 ? await insertSetting(tx, row) : await updateSetting(tx, row, version);
    const rows = await listSettingRows(tx, site.id);
    const current = presentPolicy(
      key,
      sitePolicyFrom(rows),
      rows.find((candidate) => candidate.key === key),
    );
    if (!isSaved) {
      throw staleVersion('this policy', current);
    }
    await recordAudit(deps, tx, {
      actor,
      site,
      action: 'policy.edit',
      subjectKind: 'policy',
      subjectId: rows.find((candidate) => candidate.key === key)?.id ?? null,
      before: { key, value: sitePolicyFrom(before)[key] },
      after: { key, value },
    });
    return current;
  });
}

function requireFit(key: PolicyKey, given: unknown): PolicyValue {
  const judgement = judgePolicyValue(key, given);
  if (judgement.kind === 'unfit') {
    throw problem('input.invalid', {
      detail: judgement.reason,
      errors: [{ detail: judgement.reason, pointer: '#/value' }],
    });
  }
  return judgement.value;
}

export async function getWorkingHours(deps: Reading, site: SiteScope): Promise<WorkingHoursDto> {
  return presentWorkingHours(await getHoursRows(deps.db, site.id));
}

export async function setWorkingHours(
  deps: Changing,
  actor: SignedIn,
  site: SiteScope,
  change: z.output<typeof setWorkingHoursContract.body>,
): Promise<WorkingHoursDto> {
  return deps.transact(async (tx) => {
    const before = presentWorkingHours(await getHoursRows(tx, site.id));
    const at = deps.clock.now();
    const hours = Object.fromEntries(
      change.weekly.map((spans, index) => [String(index + 1), spans] as const),
    );
    const isSaved = await updateWeekHours(tx, {
      siteId: site.id,
      hours,
      version: change.version,
      at,
    });
    if (!isSaved) {
      throw staleVersion('the working hours', before);
    }
    await replaceExceptions(tx, site.id, change.exceptions, at);
    const after = presentWorkingHours(await getHoursRows(tx, site.id));
    await recordAudit(deps, tx, {
      actor,
      site,
      action: 'policy.edit',
      subjectKind: 'working-hours',
      subjectId: site.id,
      before,
      after,
    });
    return after;
  });
}
