import { defineRoute } from '@/app/_server/define-route';
import { notFound } from '@/app/_server/errors';
import { writeCertificateJson } from '@/lib/formats/certificate-json';
import { err, ok } from '@/lib/result';
import { fileResponse, mappingForFile, mappingParams } from '../mapping-file';

/** What proves the mapping optimal; not found where nothing was proved. */
export const GET = defineRoute({
  name: 'mapping.certificate',
  access: { role: 'viewer' },
  params: mappingParams,
  run: async ({ params, workspace }) => {
    const found = await mappingForFile(params, workspace);
    if (!found.ok) return found;
    const { name, document } = found.value;
    const certificate = document.provenance.by === 'solver' ? document.provenance.certificate : undefined;
    if (!certificate) return err(notFound('certificate'));
    const text = writeCertificateJson(certificate);
    return ok(fileResponse(text, 'application/json; charset=utf-8', name, 'certificate.json'));
  },
});
