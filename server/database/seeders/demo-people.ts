/** Everybody here is invented, as is the country they live in. */
export const DEMO_PEOPLE = {
  ilse: {
    displayName: 'Ilse Varn',
    region: 'Harrow Vale',
    timeZone: 'Europe/Lisbon',
    weightUnit: 'g',
    sells: true,
  },
  tomas: {
    displayName: 'Tomas Ekker',
    region: 'Dunmere',
    timeZone: 'America/Denver',
    weightUnit: 'ozt',
    sells: true,
  },
  nadira: {
    displayName: 'Nadira Sool',
    region: 'Port Ansel',
    timeZone: 'Europe/Helsinki',
    weightUnit: 'dwt',
    sells: true,
  },
  oswin: { displayName: 'Oswin Thale', region: 'Kestle', timeZone: 'UTC', weightUnit: 'gr', sells: true },
  bruna: {
    displayName: 'Bruna Castell',
    region: 'Marrow Point',
    timeZone: 'America/New_York',
    weightUnit: 'ozt',
    sells: false,
  },
  hale: { displayName: 'Hale Dorric', region: 'Low Tannery', timeZone: 'UTC', weightUnit: 'g', sells: false },
  wren: {
    displayName: 'Wren Obuya',
    region: 'Harrow Vale',
    timeZone: 'Europe/Lisbon',
    weightUnit: 'g',
    sells: true,
  },
} as const;

export const DEMO_STAFF = {
  desk: { displayName: 'Maud Perrin', region: 'Orrin', role: 'desk' },
  desk2: { displayName: 'Ruben Ashgrove', region: 'Orrin', role: 'desk' },
  lab: { displayName: 'Sable Creek Bench', region: 'Sable Creek', role: 'lab' },
  admin: { displayName: 'Edda Lorne', region: 'Orrin', role: 'admin' },
} as const;

export type PersonKey = keyof typeof DEMO_PEOPLE;
export type StaffKey = keyof typeof DEMO_STAFF;

/** Where the buyers want their parcels. */
export const DEMO_ADDRESSES = {
  bruna: {
    name: 'Bruna Castell',
    line1: '14 Quarry Stairs',
    line2: '',
    city: 'Marrow Point',
    postcode: '40112',
    region: 'Lower Vale',
    country: 'US',
    phone: '+1 555 010 4471',
  },
  hale: {
    name: 'Hale Dorric',
    line1: '3 Tanner’s Rest',
    line2: 'Rear workshop',
    city: 'Low Tannery',
    postcode: '40190',
    region: 'Lower Vale',
    country: 'US',
    phone: '+1 555 010 9902',
  },
  wren: {
    name: 'Wren Obuya',
    line1: '27 Coldwell Lane',
    line2: '',
    city: 'Harrow Vale',
    postcode: '40007',
    region: 'Upper Vale',
    country: 'US',
    phone: '+1 555 010 1218',
  },
} as const;
export type BuyerKey = keyof typeof DEMO_ADDRESSES;

export const DEMO_LABORATORIES = [
  {
    name: 'Orrin Assay Rooms',
    accreditationBody: 'Vale Accreditation Board',
    accreditationNumber: '4471',
    scope: 'Gold and silver in alloys: fire assay to ISO 11426, titration to ISO 13756',
    region: 'Orrin',
    contact: 'registry@orrin-assay.example',
    validUntil: '2028-06-30',
    isActive: true,
  },
  {
    name: 'Sable Creek Laboratory',
    accreditationBody: 'Vale Accreditation Board',
    accreditationNumber: '4519',
    scope: 'Gold, platinum and palladium: fire assay, ICP-OES to ISO 11494 and ISO 11495',
    region: 'Sable Creek',
    contact: 'reports@sable-creek.example',
    validUntil: '2027-12-31',
    isActive: true,
  },
  {
    name: 'Fenwick and Daughters',
    accreditationBody: 'Lowland Council for Testing',
    accreditationNumber: 'LCT-0083',
    scope: 'High-purity silver by difference to ISO 15096',
    region: 'Kestle',
    contact: 'office@fenwick-daughters.example',
    validUntil: '2026-03-31',
    isActive: true,
  },
] as const;
