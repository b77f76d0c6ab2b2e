import type { AcceptedMediaType } from '#shared/contracts/files.contract.ts';

/** First bytes by which each format is known: ISO 32000-1 7.5.2, PNG (ISO/IEC 15948) 5.2, JPEG (ITU-T T.81) B.1.1.3. */
const signatures: readonly (readonly [AcceptedMediaType, readonly number[]])[] = [
  ['application/pdf', [0x25, 0x50, 0x44, 0x46, 0x2d]],
  ['image/png', [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a]],
  ['image/jpeg', [0xff, 0xd8, 0xff]],
];

/** The type of a file told from its content, or null where it is none that is accepted. */
export function detectMediaType(bytes: Uint8Array): AcceptedMediaType | null {
  const found = signatures.find(([, start]) => start.every((byte, at) => bytes[at] === byte));
  return found?.[0] ?? null;
}
