import { z } from 'zod';
import {
  instant,
  noBody,
  noQuery,
  recordNumber,
  recordNumberText,
  siteParams,
  siteRecordParams,
} from './common.ts';
import { defineContract } from './define-contract.ts';

export const acceptedMediaTypes = ['application/pdf', 'image/png', 'image/jpeg'] as const;
export type AcceptedMediaType = (typeof acceptedMediaTypes)[number];
export const maxFileBytes = 20_000_000;

export const fileSchema = z.object({
  id: recordNumber,
  name: z.string(),
  mediaType: z.enum(acceptedMediaTypes),
  sizeBytes: z.int().positive(),
  sha256: z.string(),
  uploadedAt: instant,
});
export type FileDto = z.infer<typeof fileSchema>;

/** Sent as the file itself, not as JSON. */
export const fileContentSchema = z.object({
  name: z.string(),
  mediaType: z.enum(acceptedMediaTypes),
  sha256: z.string(),
  bytes: z.custom<Uint8Array>((value) => value instanceof Uint8Array),
});
export type FileContent = Omit<z.infer<typeof fileContentSchema>, 'bytes'> & {
  readonly bytes: Uint8Array;
};

/** The body is the file itself, `Content-Type: application/octet-stream`. */
export const uploadFile = defineContract({
  name: 'upload-file',
  method: 'POST',
  path: '/api/sites/:site/files',
  summary: 'Stores a PDF, PNG or JPEG of at most 20 MB, told by its content.',
  params: siteParams,
  query: z.strictObject({
    name: z
      .string()
      .trim()
      .min(1, 'give the file a name')
      .max(200, 'a file name has at most 200 characters')
      .regex(/^[^\u0000-\u001f\u007f/\\]+$/, 'a file name holds no slashes or control characters'),
    projectId: recordNumberText.exactOptional(),
    /** Checked when given, so that a damaged transfer is noticed. */
    sha256: z
      .string()
      .regex(/^[0-9a-f]{64}$/, 'sha256 is 64 lower-case hexadecimal digits')
      .exactOptional(),
  }),
  body: z.custom<Uint8Array>((value) => value instanceof Uint8Array, {
    error: 'send the file itself as application/octet-stream',
  }),
  response: fileSchema,
  status: 201,
  access: { kind: 'site-reader' },
  idempotent: true,
  problems: ['file.type', 'file.too-large', 'file.incomplete'],
});

export const getFile = defineContract({
  name: 'get-file',
  method: 'GET',
  path: '/api/sites/:site/files/:id',
  summary: 'What is known of a stored file.',
  params: siteRecordParams,
  query: noQuery,
  body: noBody,
  response: fileSchema,
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: [],
});

export const downloadFile = defineContract({
  name: 'download-file',
  method: 'GET',
  path: '/api/sites/:site/files/:id/content',
  summary: 'The file itself.',
  params: siteRecordParams,
  query: noQuery,
  body: noBody,
  response: fileContentSchema,
  status: 200,
  access: { kind: 'site-reader' },
  idempotent: false,
  problems: ['file.incomplete'],
});
