import { randomInt } from 'node:crypto';
import { drawReport } from '#server/database/seeders/draw-report.ts';
import { drawSpecimen } from '#server/database/seeders/draw-specimen.ts';

/** A calendar day in UTC, so many days ago. */
export function dayAgo(days: number): string {
  return new Date(Date.now() - days * 86_400_000).toISOString().slice(0, 10);
}

type SentFile = { name: string; mimeType: string; buffer: Buffer };

/** A picture that nobody has sent before. */
export async function newPhoto(name: string): Promise<SentFile> {
  const buffer = await drawSpecimen('button', name, randomInt(1_000_000));
  return { name: `${name}.jpg`, mimeType: 'image/jpeg', buffer };
}

export type ReportFacts = {
  issuedOn: string;
  laboratory: string;
  number: string;
  mass: string;
  mark: string;
  permille: string;
};

/** A report of a laboratory as a PDF, with what the seller is going to type. */
export async function newReport(facts: ReportFacts): Promise<SentFile> {
  const buffer = await drawReport({
    laboratory: facts.laboratory,
    accreditation: 'Vale Accreditation Board, no. 4471',
    number: facts.number,
    customer: 'A workshop, address on file',
    item: 'One button',
    mass: facts.mass,
    mark: facts.mark,
    sampling: 'sampled by the laboratory from the item',
    issuedOn: facts.issuedOn,
    results: [
      { element: 'Au', permille: facts.permille, uncertainty: '0.5', method: 'fire assay, ISO 11426' },
    ],
  });
  return { name: `${facts.number}.pdf`, mimeType: 'application/pdf', buffer };
}
