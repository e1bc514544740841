import { scaleLinear } from "d3-scale";
import { useRef } from "react";
import type { Distribution, DistributionBin } from "#shared/estimate/result.ts";
import { formatNumber, formatSignificant } from "../../components/ui/format.ts";
import { useElementSize } from "../../components/ui/use-element-size.ts";
import { COUNT_CLASSES, countClass } from "../../map/count-classes.ts";

const WIDEST = 640;
const PLOT = 180;
const MARK = 8;
/** Up to this many picks in the fullest bin each pick is a mark of its own; above it a bin is a bar. */
const MOST_MARKS = 22;

interface CountPlotProps {
  readonly distribution: Distribution;
  readonly plural: string;
}

/** How the counts are spread: one mark a counted pick, or a bar where there are very many. */
export function CountPlot(props: CountPlotProps) {
  const place = useRef<HTMLDivElement>(null);
  const { width } = useElementSize(place);
  return (
    <div ref={place}>
      <Plot {...props} across={width === 0 ? WIDEST : Math.min(WIDEST, width)} />
    </div>
  );
}

function Plot({ distribution, plural, across }: CountPlotProps & { readonly across: number }) {
  const { bins, mean } = distribution;
  const most = Math.max(1, ...bins.map(({ picks }) => picks));
  const last = bins.at(-1)?.to ?? 1;
  const x = scaleLinear([0, Math.max(1, last)], [18, across - 18]);
  const unit = Math.min(MARK, (PLOT - 30) / most);
  const width = Math.max(4, Math.min(16, ((across - 36) / Math.max(1, last + 1)) * 0.8));
  return (
    <svg
      className="block w-full"
      viewBox={`0 0 ${across} ${PLOT + 40}`}
      role="img"
      aria-label={plotText(distribution, plural)}
    >
      {bins.map((bin) => (
        <Bin key={bin.to} bin={bin} at={x(middleOf(bin))} unit={unit} width={width} asMarks={most <= MOST_MARKS} />
      ))}
      <path d={`M6 ${PLOT}H${across - 6}`} stroke="var(--color-ink)" />
      <path d={`M${x(mean)} 24V${PLOT}`} stroke="var(--color-act)" strokeWidth="2" />
      <text x={x(mean) + 5} y="34" fontSize="12" fontWeight="600" fill="var(--color-act)">
        {`mean ${formatSignificant(mean, 3)}`}
      </text>
      {x
        .ticks(7)
        .filter(Number.isInteger)
        .map((tick) => (
          <g key={tick}>
            <path d={`M${x(tick)} ${PLOT}v5`} stroke="var(--color-ink)" />
            <text x={x(tick)} y={PLOT + 18} textAnchor="middle" fontSize="12" fill="var(--color-ink-2)">
              {formatNumber(tick)}
            </text>
          </g>
        ))}
      <text x="6" y={PLOT + 36} fontSize="12" fill="var(--color-ink-2)">
        {`${plural} in a cell`}
      </text>
    </svg>
  );
}

interface BinProps {
  readonly bin: DistributionBin;
  readonly at: number;
  readonly unit: number;
  readonly width: number;
  readonly asMarks: boolean;
}

function Bin({ bin, at, unit, width, asMarks }: BinProps) {
  if (bin.picks === 0) return null;
  const fill = COUNT_CLASSES[countClass(bin.to)].fill;
  const marks = asMarks ? Array.from({ length: bin.picks }, (_, index) => index) : [];
  const top = PLOT - bin.picks * unit;
  return (
    <g>
      {asMarks ? (
        marks.map((mark) => (
          <rect
            key={mark}
            x={at - width / 2}
            y={PLOT - (mark + 1) * unit + 1}
            width={width}
            height={Math.max(1.5, unit - 1.5)}
            fill={fill}
            stroke="var(--color-ink)"
            strokeWidth="0.75"
          />
        ))
      ) : (
        <rect
          x={at - width / 2}
          y={top}
          width={width}
          height={PLOT - top}
          fill={fill}
          stroke="var(--color-ink)"
          strokeWidth="0.75"
        />
      )}
      <text x={at} y={top - 5} textAnchor="middle" fontSize="11" fill="var(--color-ink-2)">
        {formatNumber(bin.picks)}
      </text>
    </g>
  );
}

const middleOf = (bin: DistributionBin): number => (bin.from + bin.to) / 2;

function plotText({ bins, zeros, mean }: Distribution, plural: string): string {
  const picks = bins.reduce((sum, bin) => sum + bin.picks, 0);
  return `Counts of ${picks} picks: ${zeros} found no ${plural}, mean ${formatSignificant(mean, 3)}. The table below holds the same numbers.`;
}
