import { ASSAY_METHOD_KEYS, ASSAY_METHODS } from '#shared/assay/methods.ts';
import { FINENESS_UNIT_LABELS, FINENESS_UNITS, WHOLE_OF_UNIT } from '#shared/fineness.ts';
import { GRAMS_PER_UNIT, MASS_MAX_DECIMALS, MASS_UNIT_LABELS, MASS_UNITS } from '#shared/mass.ts';
import { METALS } from '#shared/metals.ts';
import { DEFAULT_WEIGHT_STEP } from '#shared/settlement/melt.ts';
import { COVERAGE_FACTOR } from '#shared/uncertainty.ts';
import { FigureTable, Formula, MethodPart, Prose } from './method-part.tsx';

export function MassPart() {
  return (
    <MethodPart
      id="mass"
      title="Mass"
      source="the international pound of 0.45359237 kg exactly and 7000 grains to it (agreement of 1959; NIST SP 811, appendix B; NIST Handbook 44, appendix C); 480 grains make a troy ounce, 24 a pennyweight."
    >
      <Prose>
        A mass is kept as it was typed, value and unit, with at most {MASS_MAX_DECIMALS} digits after the dot,
        and beside it in grams, exactly. Other units are shown for reading and never computed with. “oz” alone
        is never taken: a troy ounce is about a tenth heavier than the ounce of kitchen scales.
      </Prose>
      <FigureTable
        caption="Grams in one of each unit"
        heads={[{ text: 'unit' }, { text: 'grams, exact', isFigure: true }]}
        rows={MASS_UNITS.map((unit) => ({
          key: unit,
          cells: [MASS_UNIT_LABELS[unit], GRAMS_PER_UNIT[unit]],
        }))}
      />
    </MethodPart>
  );
}

export function FinenessPart() {
  return (
    <MethodPart
      id="fineness"
      title="Fineness"
      source="fineness as parts per thousand by mass, ISO 9202; karat as twenty-fourths, common practice."
    >
      <Prose>
        Fineness is the part by mass that is the one metal, in parts per thousand (‰). Karat is a number of
        twenty-fourths and stays that fraction: 14 karat is 583.333… ‰ and not 585, which is a fineness of its
        own. Fractions of one lot may not make more than the whole.
      </Prose>
      <FigureTable
        caption="Pure metal in each way to write fineness"
        heads={[{ text: 'written in' }, { text: 'pure metal is', isFigure: true }]}
        rows={FINENESS_UNITS.map((unit) => ({
          key: unit,
          cells: [FINENESS_UNIT_LABELS[unit], WHOLE_OF_UNIT[unit]],
        }))}
      />
    </MethodPart>
  );
}

export function MeltPart() {
  return (
    <MethodPart
      id="melt"
      title="Melt value and rounding"
      source="rounding of the sheet is a rule of this house, so that a printed sheet can be added up by hand; the check values of the tests are named beside them."
    >
      <Formula>
        fine mass = gross mass × fineness ÷ 1000; in troy ounces: ÷ {GRAMS_PER_UNIT.ozt} g
        <br />
        amount of a metal = fine mass, rounded × quote; melt value = sum of the amounts
      </Formula>
      <ul className="flex max-w-prose list-disc flex-col gap-2 pl-5">
        <li>
          The mass of a metal line is rounded to the weight step of the sheet,{' '}
          <span className="fig">{DEFAULT_WEIGHT_STEP}</span> oz t unless its terms name another; its amount is
          that mass × rate, rounded once to the cent.
        </li>
        <li>A line in percent takes its share of the sum of the lines above it, rounded once to the cent.</li>
        <li>Every other line of money is rounded once to the cent. Nothing else is rounded.</li>
        <li>Half a unit is rounded away from zero.</li>
        <li>Numbers are decimal from end to end; no binary fraction ever carries money, mass or fineness.</li>
        <li>
          The price in percent of melt is price × 100 ÷ melt value, to two digits. It is told beside the price
          and decides nothing.
        </li>
      </ul>
    </MethodPart>
  );
}

function rangesOf(key: (typeof ASSAY_METHOD_KEYS)[number]): string {
  const { ranges } = ASSAY_METHODS[key];
  const parts = METALS.flatMap((metal) => {
    const range = ranges[metal];
    return range ? [`${metal} ${range.low} to ${range.high}`] : [];
  });
  return parts.join('; ');
}

export function UncertaintyPart() {
  return (
    <MethodPart
      id="uncertainty"
      title="How sure a figure is"
      source="GUM (JCGM 100:2008) 4.3.7, 5.1.2 and 6.2; error limits of balances OIML R 76-1, second-hand; scopes of the methods as named in the table. The uncertainties in the last column are from memory: they stand in only where none was given, and are labelled as assumed."
    >
      <Prose>
        Every value carries its expanded uncertainty, k = {COVERAGE_FACTOR.toString()}, about 95 %. The inputs
        are taken as independent: the balance moves every metal of a lot at once, each assay only its own. The
        spread of the quote is no part of it.
      </Prose>
      <Formula>
        u(mass) = readability ÷ √12, or the class limit in service ÷ √3 where the balance’s class is given and
        that is larger
        <br />
        u(melt)² = Σ (how the value moves with an input × u(input))²; U = {COVERAGE_FACTOR.toString()} × u
      </Formula>
      <Prose>
        A readability that was left out is one unit of the last digit typed. An uncertainty of the assay that
        was left out is the default of its method. The sheet lists both as assumed.
      </Prose>
      <FigureTable
        caption="Assay methods, their range and the uncertainty assumed when none is given"
        heads={[
          { text: 'method' },
          { text: 'standard' },
          { text: 'range, ‰' },
          { text: 'assumed U, ‰', isFigure: true },
        ]}
        rows={ASSAY_METHOD_KEYS.map((key) => {
          const method = ASSAY_METHODS[key];
          return {
            key,
            cells: [
              method.isSurfaceOnly ? `${method.name} (surface only)` : method.name,
              method.standard ?? 'none',
              <span key="range">
                {rangesOf(key)}
                <span className="block max-w-72 text-note text-ink-2">{method.rangeSource}</span>
              </span>,
              method.defaultExpandedPermille,
            ],
          };
        })}
      />
    </MethodPart>
  );
}
