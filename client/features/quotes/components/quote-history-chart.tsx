import { METAL_NAMES, type Metal } from '#shared/metals.ts';
import { formatAmount, formatDate } from '../../../lib/format.ts';
import { useWidth } from '../../../lib/use-width.ts';
import { CHART_HEIGHT, quoteChart, type HistoryPoint, type QuoteChart } from '../quote-chart-geometry.ts';

type QuoteHistoryChartProps = { metal: Metal; unitLabel: string; history: HistoryPoint[] };

function summary(metal: Metal, unitLabel: string, history: HistoryPoint[]): string {
  const [first, last] = [history[0], history.at(-1)];
  if (!first || !last) return '';
  const told = ({ day, price }: HistoryPoint) => `US$ ${formatAmount(price)} on ${formatDate(day)}`;
  return `${METAL_NAMES[metal]} per ${unitLabel}: ${told(first)}, ${told(last)}. Every day stands in the table below.`;
}

/** '7 Nov' */
function shortDay(day: string): string {
  const [number, month = ''] = formatDate(day).split(' ');
  return `${number} ${month.slice(0, 3)}`;
}

/** One line for one metal, in ink: a rise is no better than a fall. */
export function QuoteHistoryChart({ metal, unitLabel, history }: QuoteHistoryChartProps) {
  const [box, width] = useWidth<HTMLDivElement>(560);
  const chart = quoteChart(history, width);
  return (
    <div ref={box} className="w-full overflow-hidden">
      {chart && (
        <svg
          role="img"
          aria-label={summary(metal, unitLabel, history)}
          width={width}
          height={CHART_HEIGHT}
          viewBox={`0 0 ${width} ${CHART_HEIGHT}`}
          className="block"
        >
          <ChartRules chart={chart} width={width} />
          <path d={chart.path} fill="none" className="stroke-ink" strokeWidth="1.5" strokeLinejoin="round" />
          <LastPoint chart={chart} />
        </svg>
      )}
    </div>
  );
}

function ChartRules({ chart, width }: { chart: QuoteChart; width: number }) {
  const right = width - 8;
  return (
    <g className="fill-ink-2 font-mono text-[11px]">
      {chart.prices.map((tick) => (
        <g key={tick.text}>
          <line x1={64} x2={right} y1={tick.y} y2={tick.y} className="stroke-rule" />
          <text x={58} y={tick.y + 4} textAnchor="end">
            {tick.text}
          </text>
        </g>
      ))}
      {chart.days.map((tick, index) => (
        <g key={tick.day}>
          <line
            x1={tick.x}
            x2={tick.x}
            y1={CHART_HEIGHT - 24}
            y2={CHART_HEIGHT - 19}
            className="stroke-line"
          />
          <text
            x={tick.x}
            y={CHART_HEIGHT - 6}
            textAnchor={index === chart.days.length - 1 ? 'end' : 'middle'}
          >
            {shortDay(tick.day)}
          </text>
        </g>
      ))}
      <line x1={64} x2={right} y1={CHART_HEIGHT - 24} y2={CHART_HEIGHT - 24} className="stroke-line" />
    </g>
  );
}

function LastPoint({ chart }: { chart: QuoteChart }) {
  const last = chart.points.at(-1);
  return last ? <circle cx={last.x} cy={last.y} r="3" className="fill-ink" /> : null;
}
