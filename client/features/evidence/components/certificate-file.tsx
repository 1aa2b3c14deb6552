import { useEffect, useRef, useState } from 'react';
import { DOCUMENT_BYTES_MAX } from '#shared/limits.ts';
import { Field } from '../../../components/ui/field.tsx';
import { Progress } from '../../../components/ui/progress.tsx';
import { uploadCertificate } from '../api/upload-certificate.ts';
import { fieldIdOf } from '../../../components/lot-form/field-ids.ts';
import { useDraftForm } from '../../../components/lot-form/draft-form-context.ts';
import { DropArea } from '../../../components/lot-form/drop-area.tsx';

const TOO_LARGE = `The document is too large: at most ${DOCUMENT_BYTES_MAX / (1024 * 1024)} MB.`;
const pointer = '/certificate/fileId';

/** Sends the document at once; the one that is there stays until the new one has arrived. */
function useCertificateUpload() {
  const { code, change } = useDraftForm();
  const [sending, setSending] = useState<{ name: string; share: number } | null>(null);
  const [refusal, setRefusal] = useState<string | null>(null);
  const stop = useRef<AbortController | null>(null);
  useEffect(() => () => stop.current?.abort(), []);
  const take = async (file: File) => {
    setRefusal(null);
    if (file.size > DOCUMENT_BYTES_MAX) return setRefusal(`${file.name}: ${TOO_LARGE}`);
    const controller = new AbortController();
    stop.current = controller;
    setSending({ name: file.name, share: 0 });
    try {
      const { fileId, fileName } = await uploadCertificate(code, file, {
        signal: controller.signal,
        onProgress: (share) => setSending({ name: file.name, share }),
      });
      change((before) => ({ ...before, certificate: { ...before.certificate, fileId, fileName } }));
    } catch (error) {
      if (controller.signal.aborted) return;
      setRefusal(`${file.name}: ${error instanceof Error ? error.message : 'the document was not taken.'}`);
    }
    setSending(null);
  };
  return { sending, refusal, take };
}

export function CertificateFile() {
  const { draft, errorAt } = useDraftForm();
  const { sending, refusal, take } = useCertificateUpload();
  const { fileId, fileName } = draft.certificate;
  return (
    <Field id={fieldIdOf(pointer)} label="Document" error={refusal ?? errorAt(pointer)}>
      {(ties) => (
        <>
          <DropArea
            ties={ties}
            label="Certificate document"
            buttonText={fileId === null ? 'Choose the document' : 'Put another in its place'}
            accept="application/pdf,image/jpeg,image/png"
            disabled={sending !== null}
            onFiles={([file]) => file && void take(file)}
          >
            {fileId === null ? (
              'Or drop it here. PDF, JPEG or PNG; 10 MB at most.'
            ) : (
              <>
                <span className="font-medium text-ink">{fileName}</span> is here.
              </>
            )}
          </DropArea>
          {sending && <Progress label={sending.name} share={sending.share} />}
        </>
      )}
    </Field>
  );
}
