import { z } from 'zod';
import { roles } from '#shared/domain/policies/actions.ts';
import { grantOrigins } from '#shared/domain/states.ts';
import {
  instant,
  noBody,
  noQuery,
  pageOf,
  pageQuery,
  recordNumber,
  recordNumberText,
  siteCode,
} from './common.ts';
import { defineContract } from './define-contract.ts';

export const personGrantSchema = z.object({
  id: recordNumber,
  role: z.enum(roles),
  siteCode: siteCode.nullable(),
  /** `claim`: from the identity provider, changed there; `local`: given here, revoked here. */
  origin: z.enum(grantOrigins),
});
export const personSchema = z.object({
  id: recordNumber,
  name: z.string(),
  email: z.string().nullable(),
  lastSignedInAt: instant.nullable(),
  grants: z.array(personGrantSchema),
});
export type PersonDto = z.infer<typeof personSchema>;

export const listPeople = defineContract({
  name: 'list-people',
  method: 'GET',
  path: '/api/people',
  summary: 'Everybody who ever signed in, by name, with their roles.',
  params: z.strictObject({}),
  query: z.strictObject({ ...pageQuery, text: z.string().trim().max(60).exactOptional() }),
  body: noBody,
  response: pageOf(personSchema),
  status: 200,
  access: { kind: 'action', action: 'people.manage' },
  idempotent: false,
  problems: [],
});

export const addGrant = defineContract({
  name: 'add-grant',
  method: 'POST',
  path: '/api/people/:id/grants',
  summary: 'Gives a person a role at one site or at every site.',
  params: z.strictObject({ id: recordNumberText }),
  query: noQuery,
  body: z.strictObject({ role: z.enum(roles), siteCode: siteCode.nullable() }),
  response: personSchema,
  status: 201,
  access: { kind: 'action', action: 'people.manage' },
  idempotent: true,
  problems: [],
});

export const revokeGrant = defineContract({
  name: 'revoke-grant',
  method: 'DELETE',
  path: '/api/people/:id/grants/:grantId',
  summary: 'Takes a role given here away again; not the own administration.',
  params: z.strictObject({ id: recordNumberText, grantId: recordNumberText }),
  query: noQuery,
  body: noBody,
  response: personSchema,
  status: 200,
  access: { kind: 'action', action: 'people.manage' },
  idempotent: false,
  problems: ['person.self', 'person.claim'],
});
