import { createHash } from 'node:crypto';
import type { SignedIn, SiteScope } from '#server/actor.ts';
import type { Deps } from '#server/deps.ts';
import { recordAudit } from '#server/features/audit/audit.service.ts';
import { notFound, problem } from '#server/problem.ts';
import { acceptedMediaTypes, maxFileBytes } from '#shared/contracts/files.contract.ts';
import type { AcceptedMediaType, FileContent, FileDto } from '#shared/contracts/files.contract.ts';
import { seesProject } from '#shared/domain/policies/sees-project.ts';
import { detectMediaType } from './detect-media-type.ts';
import { findFileRow, insertFile, readFileBytes } from './files.repository.ts';
import type { FileRow } from './files.repository.ts';

export type Upload = {
  readonly name: string;
  readonly bytes: Uint8Array;
  readonly projectId?: number;
  readonly sha256?: string;
};

/** Stores a file whole or not at all; its type is told from its content. */
export async function uploadFile(
  deps: Pick<Deps, 'clock' | 'requestId' | 'transact'>,
  actor: SignedIn,
  site: SiteScope,
  upload: Upload,
): Promise<FileDto> {
  const { name, bytes, projectId } = upload;
  if (projectId !== undefined && !seesProject(actor, site.code, projectId)) {
    throw notFound('such project');
  }
  const mediaType = requireAcceptable(bytes);
  const sha256 = hashOf(bytes);
  if (upload.sha256 !== undefined && upload.sha256 !== sha256) {
    throw problem('file.incomplete', {
      detail: 'The file arrived changed: its SHA-256 is not the one announced. Send it again.',
    });
  }
  return deps.transact(async (tx) => {
    const row = await insertFile(
      tx,
      {
        siteId: site.id,
        projectId: projectId ?? null,
        name,
        mediaType,
        sha256,
        uploadedById: actor.personId,
        createdAt: deps.clock.now(),
      },
      bytes,
    );
    await recordAudit(deps, tx, {
      actor,
      site,
      action: 'file.upload',
      subjectKind: 'file',
      subjectId: row.id,
      after: { mediaType, sizeBytes: bytes.byteLength, sha256 },
    });
    return presentFile(row);
  });
}

export async function getFile(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  site: SiteScope,
  id: number,
): Promise<FileDto> {
  return presentFile(await requireVisible(deps, actor, site, id));
}

export async function downloadFile(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  site: SiteScope,
  id: number,
): Promise<FileContent> {
  const row = await requireVisible(deps, actor, site, id);
  const bytes = await readFileBytes(deps.db, id);
  if (hashOf(bytes) !== row.sha256) {
    throw problem('file.incomplete', {
      detail: `File ${id} no longer matches its checksum. Tell your administrator to restore it from the backup.`,
    });
  }
  const { name, mediaType, sha256 } = presentFile(row);
  return { name, mediaType, sha256, bytes };
}

/** Another site's file and a file of a project the person does not see are not there for them. */
async function requireVisible(
  deps: Pick<Deps, 'db'>,
  actor: SignedIn,
  site: SiteScope,
  id: number,
): Promise<FileRow> {
  const row = await findFileRow(deps.db, id);
  const isVisible =
    row?.siteId === site.id &&
    (row.projectId === null || seesProject(actor, site.code, row.projectId));
  if (row === undefined || !isVisible) {
    throw notFound('such file');
  }
  return row;
}

function requireAcceptable(bytes: Uint8Array): AcceptedMediaType {
  if (bytes.byteLength > maxFileBytes) {
    throw problem('file.too-large', {
      detail: 'A file has at most 20 MB. Send a smaller one, e.g. scanned at a lower resolution.',
    });
  }
  const mediaType = detectMediaType(bytes);
  if (mediaType === null) {
    throw problem('file.type', {
      detail:
        'The content is neither PDF nor PNG nor JPEG, whatever the name says. Save it as one of these and send it again.',
      accepted: acceptedMediaTypes,
    });
  }
  return mediaType;
}

function presentFile(row: FileRow): FileDto {
  const mediaType = acceptedMediaTypes.find((accepted) => accepted === row.mediaType);
  if (mediaType === undefined) {
    throw new Error(`File ${row.id} is stored under a type that is not accepted.`);
  }
  return {
    id: row.id,
    name: row.name,
    mediaType,
    sizeBytes: row.sizeBytes,
    sha256: row.sha256,
    uploadedAt: row.createdAt.toISOString(),
  };
}

function hashOf(bytes: Uint8Array): string {
  return createHash('sha256').update(bytes).digest('hex');
}
