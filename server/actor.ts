import type { Grant } from '#shared/domain/policies/types.ts';

/** The person behind a call, as permission, audit and presentation need them. */
export type SignedIn = {
  readonly personId: number;
  readonly name: string;
  readonly grants: readonly Grant[];
  readonly projectIds: readonly number[];
};

/** The site named in the path of a call. */
export type SiteScope = {
  readonly id: number;
  readonly code: string;
  readonly name: string;
  readonly zone: string;
};
