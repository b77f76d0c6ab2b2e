import type { Role } from './actions.ts';

/** One role a person holds: at one site, or at every site (`siteCode` null). */
export type Grant = { readonly role: Role; readonly siteCode: string | null };

/** Who acts, as far as permission depends on it. */
export type Actor = {
  readonly personId: number;
  readonly grants: readonly Grant[];
  /** Projects the person is a member of. */
  readonly projectIds: readonly number[];
};

/**
 * What is acted on, as far as permission depends on it. Leave the subject out to ask "may this person
 * do such a thing at all"; name it to ask "may they do it to this one".
 */
export type Subject = {
  /** Whose request or booking it is. */
  readonly ownerId?: number;
  /** Who wrote the calibration or asked for the deviation; a second person must decide. */
  readonly authorId?: number;
  readonly projectId?: number;
  /** The site's policy lets engineers confirm offers for their own requests. */
  readonly engineersMayConfirm?: boolean;
};
