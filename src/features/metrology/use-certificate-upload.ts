import { useMutation } from '@tanstack/react-query';
import { uploadFile } from '#shared/contracts/files.contract.ts';
import { useSite } from '#src/hooks/use-site.ts';
import { callApi } from '#src/lib/call-api.ts';

/** SHA-256 in lower-case hexadecimal, so that the server notices a damaged transfer. */
async function sha256Of(bytes: Uint8Array<ArrayBuffer>): Promise<string> {
  const digest = await crypto.subtle.digest('SHA-256', bytes);
  return [...new Uint8Array(digest)].map((byte) => byte.toString(16).padStart(2, '0')).join('');
}

/** Sends a certificate; the same file sent again after a lost answer is stored once. */
export function useCertificateUpload(onDone: (fileId: number) => void) {
  const site = useSite();
  return useMutation({
    mutationFn: async ({ file, key }: { file: File; key: string }) => {
      const bytes = new Uint8Array(await file.arrayBuffer());
      // Only where the page is served securely or from this machine.
      const sha256 = 'subtle' in crypto ? { sha256: await sha256Of(bytes) } : {};
      return callApi(uploadFile, {
        params: { site: site.code },
        query: { name: file.name, ...sha256 },
        body: bytes,
        idempotencyKey: key,
      });
    },
    onSuccess: (stored) => {
      onDone(stored.id);
    },
  });
}
