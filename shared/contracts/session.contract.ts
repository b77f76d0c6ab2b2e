import { z } from 'zod';
import { roles } from '#shared/domain/policies/actions.ts';
import { noBody, noQuery, recordNumber, siteCode } from './common.ts';
import { defineContract } from './define-contract.ts';

export const grantSchema = z.object({
  role: z.enum(roles),
  /** Null: at every site. */
  siteCode: siteCode.nullable(),
});

export const sessionSchema = z.object({
  organisation: z.string(),
  /** Null: nobody is signed in. */
  person: z
    .object({
      personId: recordNumber,
      name: z.string(),
      grants: z.array(grantSchema),
      projectIds: z.array(recordNumber),
    })
    .nullable(),
  /** Sites at which the person holds a role, with the roles in force there. */
  sites: z.array(
    z.object({
      code: siteCode,
      name: z.string(),
      zone: z.string(),
      roles: z.array(z.enum(roles)),
    }),
  ),
  /** Sent back with every change in the header X-Millpond-Csrf. */
  csrfToken: z.string().nullable(),
  /** Present only in a demo: who can be signed in with one click, and where its mails are shown. */
  demo: z
    .object({
      people: z.array(
        z.object({
          sub: z.string(),
          name: z.string(),
          role: z.string(),
          site: z.string().nullable(),
          note: z.string().nullable(),
        }),
      ),
      mailUrl: z.string().nullable(),
    })
    .nullable(),
});
export type SessionDto = z.infer<typeof sessionSchema>;

export const getSession = defineContract({
  name: 'get-session',
  method: 'GET',
  path: '/api/session',
  summary: 'Who is signed in, with what roles where, and the token every change must carry.',
  params: z.strictObject({}),
  query: noQuery,
  body: noBody,
  response: sessionSchema,
  status: 200,
  access: { kind: 'public' },
  idempotent: false,
  problems: [],
});
