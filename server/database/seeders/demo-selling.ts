import { dec } from '#shared/decimal.ts';
import { valuate } from '#shared/settlement/valuation.ts';
import { databaseNow } from '#server/database/transaction.ts';
import { newestQuotes, quoteRefs } from '#server/features/quotes/quote-queries.ts';
import { uploadPhoto } from '#server/features/photos/upload-photo.ts';
import { actorOf } from '#server/features/members/member-queries.ts';
import { Certificate } from '#server/models/certificate.ts';
import { Laboratory } from '#server/models/laboratory.ts';
import { Lot } from '#server/models/lot.ts';
import { Member } from '#server/models/member.ts';
import { DEMO_LABORATORIES } from './demo-people.ts';
import type { DemoLot } from './demo-lot.ts';
import { drawingsOf } from './demo-drawings.ts';
import type { DemoPerson } from './demo-stage.ts';
import { drawReport } from './draw-report.ts';

/** The price that the seller asks: so many per cent of the melt value at that day's quotes, in whole cents. */
async function priceOf(lot: DemoLot): Promise<string> {
  if (lot.mass === '') return '';
  const contents = lot.contents
    .filter((content) => content.paidFor)
    .map(({ metal, permille }) => ({ metal, fineness: { value: permille, unit: 'permille' } }));
  const quotes = quoteRefs(await newestQuotes(await databaseNow()));
  const { total } = valuate({ mass: { value: lot.mass, unit: lot.unit }, contents } as never, quotes);
  return dec(total.value).times(lot.percentOfMelt).div(100).toDecimalPlaces(2).toString();
}

async function addPhotos(lot: DemoLot, row: Lot, seller: DemoPerson): Promise<void> {
  const actor = actorOf(await Member.findByPk(seller.id, { rejectOnEmpty: true }));
  for (const [index, { caption, content }] of (await drawingsOf(lot)).entries()) {
    await uploadPhoto(row.id, { name: `${lot.key}-${index + 1}.jpg`, content }, actor, {
      isDrawing: true,
      caption,
    });
  }
}

async function addReport(
  lot: DemoLot,
  code: string,
  seller: DemoPerson,
  issuedOn: string,
): Promise<{ fileId: string; fileName: string }> {
  const laboratory = DEMO_LABORATORIES[lot.laboratory];
  const content = await drawReport({
    laboratory: laboratory.name,
    accreditation: `${laboratory.accreditationBody}, no. ${laboratory.accreditationNumber}`,
    number: lot.reportNumber,
    customer: `${seller.key}, workshop address on file`,
    item: `One ${lot.form}, ${lot.title}`,
    mass: `${lot.mass} ${lot.unit}`,
    mark: lot.mark,
    sampling:
      lot.sampledByCustomer === true
        ? 'as received, sampled by the customer'
        : 'sampled by the laboratory from the item',
    issuedOn,
    results: lot.contents.map(({ metal, permille, uncertainty, method }) => ({
      element: metal,
      permille,
      uncertainty,
      method,
    })),
  });
  const answer = await seller.visitor.upload(
    `/api/v1/lots/${code}/certificate`,
    `${lot.reportNumber}.pdf`,
    'application/pdf',
    content,
  );
  return { fileId: String(answer.fileId), fileName: String(answer.fileName) };
}

/** Writes the draft, adds drawings and report, and submits unless it stays a draft. Answers the lot's code. */
export async function writeLot(lot: DemoLot, seller: DemoPerson, issuedOn: string): Promise<string> {
  const made = await seller.visitor.post('/api/v1/lots');
  const code = String(made.code);
  const row = await Lot.findOne({ where: { code }, rejectOnEmpty: true });
  await addPhotos(lot, row, seller);
  const contents = lot.contents.map(({ metal, permille, uncertainty, method, paidFor }) => ({
    metal,
    fineness: { value: permille, unit: 'permille' },
    uncertainty: { value: uncertainty, unit: uncertainty === '' ? '' : 'permille' },
    method,
    paidFor,
  }));
  const draft = {
    form: lot.form,
    title: lot.title,
    description: lot.description,
    gross: { value: lot.mass, unit: lot.unit },
    readability: { value: lot.readability, unit: lot.unit },
    contents,
    pricing: lot.isLinked === true ? 'linked' : 'outright',
    price: lot.isLinked === true ? '' : await priceOf(lot),
    linkedPercent: lot.isLinked === true ? lot.percentOfMelt : '',
    shipping: lot.shipping,
    destinations: [...(lot.destinations ?? ['US', 'CA'])],
    confirmsCautions: lot.submitted !== null,
    confirmsTitle: lot.submitted !== null,
  };
  const laboratory = await Laboratory.findOne({
    where: { name: DEMO_LABORATORIES[lot.laboratory].name },
    rejectOnEmpty: true,
  });
  const certificate =
    lot.submitted === null
      ? {}
      : {
          ...(await addReport(lot, code, seller, issuedOn)),
          laboratoryId: laboratory.id,
          laboratoryName: laboratory.name,
          number: lot.reportNumber,
          issuedOn,
          sampling: lot.sampledByCustomer === true ? 'customer' : 'laboratory',
          itemDescription: `One ${lot.form}`,
          itemMass: { value: lot.mass, unit: lot.unit },
          itemMark: lot.mark,
          authorisedBy: 'Head of the laboratory',
          results: contents.map(({ metal, fineness, uncertainty, method }) => ({
            element: metal,
            fineness,
            uncertainty,
            method,
          })),
        };
  const { version } = await seller.visitor.get(`/api/v1/lots/${code}`);
  await seller.visitor.put(`/api/v1/lots/${code}/draft`, { draft: { ...draft, certificate }, version });
  if (lot.submitted !== null) await seller.visitor.post(`/api/v1/lots/${code}/submit`);
  return code;
}

/** What the desk does with the report: claims it, and verifies or returns it. */
export async function decideAtDesk(
  lot: DemoLot,
  code: string,
  desk: DemoPerson,
  confirmedOn: string,
): Promise<void> {
  if (lot.desk === 'waits') return;
  const row = await Lot.findOne({ where: { code }, rejectOnEmpty: true });
  const { id } = await Certificate.findOne({
    where: { lotId: row.id, state: 'submitted' },
    rejectOnEmpty: true,
  });
  const at = `/api/v1/desk/certificates/${id}`;
  await desk.visitor.post(`${at}/claim`);
  if (lot.desk === 'claims') return;
  const { version, report } = (await desk.visitor.get(at)) as {
    version: number;
    report: { laboratory: { id: string } };
  };
  if (lot.desk === 'returns') {
    const reason =
      'The report names a mass of 25.00 g to two decimals, the lot three. Ask the laboratory for an amended report.';
    await desk.visitor.post(`${at}/return`, { version, reason });
    return;
  }
  await desk.visitor.post(`${at}/verify`, {
    version,
    laboratoryId: report.laboratory.id,
    confirmedHow: 'By telephone, at the number on our register of laboratories',
    confirmedWith: 'the registry of the laboratory',
    confirmedOn,
  });
}
