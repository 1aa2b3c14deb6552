import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { redirect, useParams, type LoaderFunctionArgs } from 'react-router-dom';
import type { LotAnswer } from '#shared/schemas/lots.ts';
import { DraftEditor } from '../features/drafting/components/draft-editor.tsx';
import { CertificateSection } from '../features/evidence/components/certificate-section.tsx';
import { PhotoSection } from '../features/evidence/components/photo-section.tsx';
import { OwnLotPage } from '../features/sell/components/own-lot-page.tsx';
import { feesQuery, ownLotQuery } from '../lib/lots.ts';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';
import { quotesQuery } from '../lib/quotes.ts';

export async function loader({ params }: LoaderFunctionArgs): Promise<Response | null> {
  const code = params.code ?? '';
  void queryClient.prefetchQuery(quotesQuery);
  void queryClient.prefetchQuery(feesQuery);
  // Read anew each time: a draft is opened on its newest version.
  const lot = await queryClient.query({ ...ownLotQuery(code), staleTime: 0 });
  return lot.isMine ? null : redirect(paths.lot(code));
}

export function Component() {
  const { code = '' } = useParams();
  const { data: lot } = useQuery(ownLotQuery(code));
  return lot ? <OwnLot key={code} lot={lot} /> : null;
}

/** What is being typed stays on the screen until the member hands it in, whatever a later reading says. */
function OwnLot({ lot }: { lot: LotAnswer }) {
  const [edited, setEdited] = useState(lot.can.edit ? lot : null);
  if (edited?.draft) {
    return (
      <DraftEditor
        lot={edited}
        draft={edited.draft}
        evidence={<Evidence />}
        onSubmitted={() => setEdited(null)}
      />
    );
  }
  return <OwnLotPage lot={lot} onRedrafted={setEdited} />;
}

function Evidence() {
  return (
    <>
      <PhotoSection />
      <CertificateSection />
    </>
  );
}
