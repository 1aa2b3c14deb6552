import type { ReactNode } from 'react';
import { useReader } from '../../lib/reader-context.ts';
import { useWidth } from '../../lib/use-width.ts';
import { formatClock, formatPercent, formatZone } from '../../lib/format.ts';
import { RuleBand, RuleLabel, Ruler } from './melt-rule-parts.tsx';
import { MeltMarkKey, MeltMarkShape } from './melt-mark.tsx';
import {
  fitWindow,
  LANE_HEIGHT,
  place,
  placeLabels,
  ruleScale,
  ruleTicks,
  sizes,
  type MeltBand,
  type MeltMark,
  type RuleScale,
  type RuleSize,
  type RuleWindow,
} from './melt-rule-geometry.ts';
import { bandLabel, markLabel, markNames, ruleText } from './melt-rule-words.ts';

type MeltRuleProps = {
  /** `row` stands in a register, `page` on the page of one lot. */
  size?: RuleSize;
  /** The 95 % range of the melt value, in % of melt. */
  band: MeltBand | null;
  /** A tender is sealed: whoever draws one passes no leading mark. */
  marks: MeltMark[];
  /** The quote the percentages rest on; null when there is no fresh one. */
  quote: { at: string | null } | null;
  /** The same window for every row of a list makes the rows comparable. */
  window?: RuleWindow;
  caption?: ReactNode;
};

/** A ruler in % of melt value: the soft band of uncertainty and, by shape, what stands where. */
export function MeltRule({ size = 'page', band, marks, quote, window, caption }: MeltRuleProps) {
  const form = sizes[size];
  const [box, width] = useWidth<HTMLDivElement>(form.before);
  const shown = quote ? marks : [];
  const shownBand = quote ? band : null;
  const fitted = fitWindow(window ?? form.window, shownBand, shown);
  const scale = ruleScale(fitted, width);
  const labels = size === 'page' ? placeLabels(labelRequests(scale, shownBand, shown), width) : [];
  const lanes = labels.reduce((most, label) => Math.max(most, label.lane + 1), 0);
  const lineY = form.line + Math.max(0, lanes - 1) * LANE_HEIGHT;
  return (
    <figure className="keep-together min-w-0">
      <div ref={box} className="w-full overflow-hidden">
        <svg
          role="img"
          aria-label={quote ? ruleText(shownBand, shown) : 'Melt rule, empty: there is no fresh quote.'}
          width={width}
          height={lineY + form.below}
          viewBox={`0 0 ${width} ${lineY + form.below}`}
          className="block"
        >
          {shownBand && <RuleBand band={shownBand} scale={scale} lineY={lineY} isLarge={size === 'page'} />}
          <Ruler
            ticks={ruleTicks(fitted, width)}
            scale={scale}
            width={width}
            lineY={lineY}
            size={size}
            isEmpty={!quote}
          />
          {labels.map((label) => (
            <RuleLabel key={label.key} label={label} lineY={lineY} />
          ))}
          {shown.map((mark) => (
            <MeltMarkShape key={mark.kind} kind={mark.kind} x={scale.x(place(mark.percent))} y={lineY} />
          ))}
        </svg>
      </div>
      <figcaption className="text-note text-ink-2">
        {size === 'row' && quote && <RowKey marks={marks} />}
        {size === 'page' && <PageCaption quote={quote} />}
        {!quote && size === 'row' && 'no fresh quote'}
        {caption}
      </figcaption>
    </figure>
  );
}

function labelRequests(scale: RuleScale, band: MeltBand | null, marks: MeltMark[]) {
  const requests = marks.map((mark) => {
    const percent = place(mark.percent);
    const off = scale.isInside(percent) ? '' : percent < 100 ? '← ' : '→ ';
    return { key: mark.kind as string, text: off + markLabel(mark), x: scale.x(percent), hasLeader: true };
  });
  if (band) {
    const middle = (scale.x(place(band.low)) + scale.x(place(band.high))) / 2;
    requests.push({ key: 'band', text: bandLabel(band), x: middle, hasLeader: false });
  }
  return requests;
}

function RowKey({ marks }: { marks: MeltMark[] }) {
  return (
    <span className="flex flex-wrap gap-x-3">
      {marks.map((mark) => (
        <span key={mark.kind} className="whitespace-nowrap">
          <MeltMarkKey kind={mark.kind} /> {markNames[mark.kind]}{' '}
          <span className="fig">{formatPercent(mark.percent)}</span>
        </span>
      ))}
    </span>
  );
}

function PageCaption({ quote }: { quote: MeltRuleProps['quote'] }) {
  const { timeZone } = useReader();
  if (!quote)
    return (
      <p>There is no fresh quote: what the metal is worth now is not known, so nothing stands on the rule.</p>
    );
  if (!quote.at) return <p>% of melt value at the quote given</p>;
  return (
    <p>
      % of melt value at the quote of {formatClock(quote.at, timeZone)} {formatZone(quote.at, timeZone)}
    </p>
  );
}
