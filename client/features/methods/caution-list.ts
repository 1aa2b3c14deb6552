export type Caution = { text: string; source?: string };
export type CautionPart = { id: string; title: string; items: Caution[] };

/** All cautions of the house. A figure names where it comes from; what was not looked up says so. */
export const CAUTIONS: readonly CautionPart[] = [
  {
    id: 'fumes',
    title: 'Acids and fumes',
    items: [
      {
        text: 'Nitrogen dioxide, the brown fume over nitric acid, injures the lungs hours after it was breathed. Short-term limit 1 ppm; 5 ppm must never be passed; 13 ppm is immediately dangerous (20 ppm in the older value).',
        source: 'NIOSH pocket guide and IDLH values 1994 and 2017; OSHA permissible limits',
      },
      {
        text: 'Hydrogen chloride: 5 ppm must never be passed; 45 ppm is immediately dangerous (50 ppm in the older value).',
        source: 'NIOSH IDLH values, revised 2025; OSHA permissible limits',
      },
      {
        text: 'Chlorine: 0.5 ppm over 15 minutes; 1 ppm must never be passed.',
        source: 'NIOSH recommended and OSHA permissible limits',
      },
      {
        text: 'Nitric acid vapour: 2 ppm over a working day, 4 ppm short-term, 25 ppm immediately dangerous.',
        source: '29 CFR 1910.1000 and NIOSH, from memory',
      },
      {
        text: 'Dust and salts: silver 0.01 mg/m³, soluble platinum 0.002 mg/m³, lead 50 µg/m³ over a working day.',
        source: 'OSHA limits, lead 29 CFR 1910.1025, from memory',
      },
      {
        text: 'Scruple gives no instructions for chemistry. Who refines needs training, a fume hood and a lawful way for the waste.',
      },
    ],
  },
  {
    id: 'residues',
    title: 'What can cling to a button, foil or powder',
    items: [
      {
        text: 'Residual acid or chloride in pores, under a skin of slag or in undried powder: it burns skin, eats balances, and gives off fumes when the metal is melted. A lot must be neutral, rinsed and dry before it is weighed and shipped.',
      },
      {
        text: 'Silver solutions left standing with ammonia, and some other compounds of silver, can become explosive. Never list, dry, scrape or post them.',
      },
      {
        text: 'Waste at or below pH 2 or at or above 12.5 is hazardous; leachate is limited to 5.0 mg/L of silver and of lead.',
        source: '40 CFR 261.22 and 261.24, from memory',
      },
    ],
  },
  {
    id: 'scrap',
    title: 'Hidden in scrap',
    items: [
      {
        text: 'Beryllium copper in springs and contacts; lead and cadmium in solders; mercury in switches and lamps; leaded glass of picture tubes; batteries. They poison through dust and fume when cut, ground or burnt.',
      },
      {
        text: 'Scrap forms are not traded here yet. E-waste across borders stays blocked: since 1 January 2025 all of it needs the prior informed consent of the states concerned.',
        source: 'Basel Convention, decision BC-15/18 (entries A1181 and Y49)',
      },
    ],
  },
  {
    id: 'false',
    title: 'What looks like gold and is not',
    items: [
      {
        text: 'Tungsten has the density of gold, 19.3 g/cm³, to the accuracy of any small scale: a filled bar passes a test of mass and volume. One density also fits several alloys.',
        source: 'Composition from density: Caley, Ohio Journal of Science, warns of accuracy overstated',
      },
      {
        text: 'X-ray fluorescence and the touchstone see the surface only; a plated or filled piece deceives both.',
        source: 'ISO 23345 for the X-ray screen, from memory',
      },
      {
        text: 'Melting, drilling or cleaning a lot may count as accepting it, and takes away what a contest rests on. Weigh first, and agree on sampling before you touch it.',
        source: 'An inference from UCC § 2-606 and 2-608 (United States)',
      },
    ],
  },
  {
    id: 'post',
    title: 'What may not be posted',
    items: [
      {
        text: 'Never list or post acids, cyanides, mercury or amalgam, wet residues, fulminating compounds, or scrap with whole lithium batteries (UN 3480, UN 3481).',
        source: 'From memory',
      },
      {
        text: 'Hydrochloric acid is UN 1789, class 8; nitric acid UN 2031, class 8, at 20 to 65 % forbidden on passenger aircraft save for a narrow provision.',
        source: '49 CFR 172.101 and provision A212; the packing groups from memory',
      },
      {
        text: 'Aqua regia, UN 1798: carriage by road is prohibited in Europe, by air forbidden. Treat it as never postable.',
        source: 'ADR table A, second-hand; air rules from memory',
      },
    ],
  },
  {
    id: 'shipping',
    title: 'Insured shipping',
    items: [
      {
        text: 'Insure for the price of the metal at least, against signature, and read what the carrier excludes: many private carriers exclude bullion. Until delivery against signature the seller bears the risk.',
      },
      {
        text: 'The national post of the United States insures a parcel up to US$ 5,000 and registered mail up to US$ 50,000.',
        source: 'Domestic Mail Manual 503.4; 503.2 second-hand',
      },
      {
        text: 'A parcel across a border needs a declaration, can owe duty or tax, and can be held. A settlement sheet is not a customs paper.',
      },
    ],
  },
  {
    id: 'licences',
    title: 'Licences, records and duties of dealers',
    items: [
      {
        text: 'United States: who in the year before bought covered goods for more than US$ 50,000 and received more than US$ 50,000 for them is a dealer and needs a written programme against money laundering. From the public alone the measure counts too.',
        source: '31 CFR 1027.100(b) and 1027.210',
      },
      {
        text: 'United States: more than US$ 10,000 in cash, in one or in related payments, is reported within 15 days (Form 8300).',
        source: '26 USC 6050I; 31 USC 5331; 31 CFR 1010.330',
      },
      {
        text: 'European Union: importers of unrefined gold above 100 kg a year owe due diligence on its origin; recycled metal is treated apart.',
        source: 'Regulation (EU) 2017/821, Annex I',
      },
      {
        text: 'Second-hand goods and pawn laws: state and city licences, the seller’s identity, holding periods of commonly 3 to 30 days, reports to the police.',
        source: 'From memory; they differ from place to place',
      },
      {
        text: 'United Kingdom: the law on scrap-metal dealers leaves out gold, silver and their alloys of 2 % and more.',
        source: 'Scrap Metal Dealers Act 2013 s. 21, from memory',
      },
      {
        text: 'Refining can need a permit for air, water and waste. Holding money for others is licensed in many places; whoever runs a house like this one needs to know which.',
        source: 'From memory',
      },
      {
        text: 'Eighteen years of age, sanctions lists, stolen goods: sellers and buyers confirm age and title; keep the other side’s identity and your photos.',
        source: 'From memory',
      },
    ],
  },
  {
    id: 'marks',
    title: 'Hallmarks and words of quality',
    items: [
      {
        text: 'United Kingdom: finished articles above 1 g of gold, 7.78 g of silver, 0.5 g of platinum or 1 g of palladium need a hallmark before they are described as such; raw metal and bullion are exempt.',
        source: 'Hallmarking Act 1973, Schedule 1 Part II; the weights second-hand',
      },
      {
        text: 'United States: “gold” below 24 karat needs its karat before the word.',
        source: '16 CFR 23.3(b)(2)',
      },
      {
        text: 'A mark never says more than what is there: 588 ‰ may be marked 585, and 584 ‰ only 375.',
        source: 'Finnish safety authority, guidance on fineness',
      },
    ],
  },
  {
    id: 'money',
    title: 'Money and tax',
    items: [
      {
        text: 'Scruple computes no tax. Gains, sales tax and value-added tax on precious metal differ by place, fineness and form.',
      },
      {
        text: 'A card payment can be called back long after a deal is over, commonly 120 days; escrow does not end that.',
        source: 'Card-network rules, from memory',
      },
      {
        text: 'A melt value is an estimate with a range, at a quote of one moment. It is no offer, and no advice to buy or sell.',
      },
    ],
  },
];
