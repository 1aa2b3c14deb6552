import { QueryTypes } from 'sequelize';
import { sequelize } from '#server/database/connection.ts';
import type { LoadedCase } from './case-queries.ts';

/** Where the same thing was seen on another lot. */
export type Sighting = { lotId: string; lotCode: string };
export type SightingOfReport = Sighting & { laboratoryId: string | null; laboratoryName: string };

/** Everything seen elsewhere that any of these cases could match; keys are folded numbers and SHA-256. */
export type FlagSources = {
  reportsByNumber: Map<string, SightingOfReport[]>;
  documentsByHash: Map<string, Sighting[]>;
  photosByHash: Map<string, Sighting[]>;
};

/** A report's number as it is compared: case and blanks do not make another number. */
export function foldNumber(number: string): string {
  return number.normalize('NFKC').replace(/\s+/gu, '').toUpperCase();
}

function grouped<Row extends Sighting>(rows: readonly (Row & { fold: string })[]): Map<string, Row[]> {
  const groups = new Map<string, Row[]>();
  for (const row of rows) groups.set(row.fold, [...(groups.get(row.fold) ?? []), row]);
  return groups;
}

async function select<Row>(sql: string, values: readonly string[]): Promise<Row[]> {
  if (values.length === 0) return [];
  return (await sequelize.query(sql, {
    replacements: { values: [...new Set(values)] },
    type: QueryTypes.SELECT,
  })) as Row[];
}

/** Three reads for any number of cases, so that the queue costs no more than a case. */
export async function findFlagSources(cases: readonly LoadedCase[]): Promise<FlagSources> {
  const numbers = cases.map(({ certificate }) => certificate.number);
  const documents = cases.map(({ certificate }) => certificate.sha256);
  const photos = cases.flatMap((each) => each.photos.map((photo) => photo.file!.sha256));
  const reports = await select<SightingOfReport & { number: string }>(
    `SELECT l.id AS lotId, l.code AS lotCode, c.number, c.laboratory_id AS laboratoryId, c.laboratory_name AS laboratoryName
     FROM certificates c JOIN lots l ON l.id = c.lot_id
     WHERE c.number IN (:values) OR REPLACE(c.number, ' ', '') IN (:values)`,
    [...numbers, ...numbers.map(foldNumber)],
  );
  const sameDocument = await select<Sighting & { fold: string }>(
    `SELECT DISTINCT l.id AS lotId, l.code AS lotCode, c.sha256 AS fold
     FROM certificates c JOIN lots l ON l.id = c.lot_id WHERE c.sha256 IN (:values)`,
    documents,
  );
  const samePhoto = await select<Sighting & { fold: string }>(
    `SELECT DISTINCT l.id AS lotId, l.code AS lotCode, f.sha256 AS fold
     FROM files f JOIN lot_photos p ON p.file_id = f.id JOIN lots l ON l.id = p.lot_id
     WHERE f.sha256 IN (:values) AND f.kind = 'photo'`,
    photos,
  );
  return {
    reportsByNumber: grouped(reports.map((row) => ({ ...row, fold: foldNumber(row.number) }))),
    documentsByHash: grouped(sameDocument),
    photosByHash: grouped(samePhoto),
  };
}
