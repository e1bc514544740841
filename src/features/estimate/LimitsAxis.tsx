import { scaleLinear } from "d3-scale";
import { useRef } from "react";
import type { EstimateResult, Interval } from "#shared/estimate/result.ts";
import { estimateText, printedLimitsOf } from "#shared/estimate/rounding.ts";
import { formatAsIs, formatNumber } from "../../components/ui/format.ts";
import { useElementSize } from "../../components/ui/use-element-size.ts";

const WIDEST = 640;
const RIGHT = 24;
const TOP = 30;
/** Below this the names stand above their lines. */
const NARROW = 480;

const NAMES = { t: "Student t", "log-normal": "Log-normal" } as const;

/** Both kinds of limits on one axis with its zero, and the number seen, under which the total can't be. */
export function LimitsAxis({ result }: { readonly result: EstimateResult }) {
  const place = useRef<HTMLDivElement>(null);
  const { width } = useElementSize(place);
  return (
    <div ref={place}>
      <Axis result={result} width={width === 0 ? WIDEST : Math.min(WIDEST, width)} />
    </div>
  );
}

function Axis({ result, width }: { readonly result: EstimateResult; readonly width: number }) {
  const isNarrow = width < NARROW;
  const left = isNarrow ? 14 : 116;
  const rowHeight = isNarrow ? 72 : 52;
  const kinds = result.declaredLimits === "t" ? (["t", "log-normal"] as const) : (["log-normal", "t"] as const);
  const rows = kinds.flatMap((kind) => {
    const limits = kind === "t" ? result.total.limits.t : result.total.limits.logNormal;
    return limits.kind === "interval" ? [{ kind, limits }] : [];
  });
  if (rows.length === 0) return null;
  const most = Math.max(...rows.map(({ limits }) => limits.upper), result.total.estimate);
  const least = Math.min(0, ...rows.map(({ limits }) => limits.lower));
  const x = scaleLinear([least, most * 1.05], [left, width - RIGHT]).nice(5);
  const height = TOP + rows.length * rowHeight + 26;
  const base = TOP + rows.length * rowHeight;
  const middle = x(result.total.estimate);
  return (
    <svg className="block w-full" viewBox={`0 0 ${width} ${height}`} role="img" aria-label={axisText(result)}>
      {x.ticks(isNarrow ? 3 : 6).map((tick) => (
        <g key={tick}>
          <path
            d={`M${x(tick)} ${TOP - 12}V${base}`}
            stroke={tick === 0 ? "var(--color-ink)" : "var(--color-rule)"}
            strokeWidth={tick === 0 ? 1.5 : 1}
          />
          <text x={x(tick)} y={base + 17} textAnchor="middle" fontSize="12" fill="var(--color-ink-2)">
            {formatNumber(tick)}
          </text>
        </g>
      ))}
      <path d={`M${left} ${base}H${width - RIGHT}`} stroke="var(--color-ink)" />
      <path d={`M${middle} ${TOP - 12}V${base}`} stroke="var(--color-act)" strokeDasharray="2 3" />
      {result.seen > 0 && <SeenMark seen={result.seen} at={x(result.seen)} base={base} width={width} />}
      {rows.map(({ kind, limits }, index) => (
        <LimitsLine
          key={kind}
          name={NAMES[kind]}
          note={kind === result.declaredLimits ? "printed large" : "beside it"}
          limits={limits}
          strong={kind === result.declaredLimits}
          y={TOP + index * rowHeight + (isNarrow ? 42 : 16)}
          nameAt={isNarrow ? -38 : 0}
          x={x}
          middle={middle}
          ends={endsOf(result, kind)}
        />
      ))}
    </svg>
  );
}

interface SeenMarkProps {
  readonly seen: number;
  readonly at: number;
  readonly base: number;
  readonly width: number;
}

function SeenMark({ seen, at, base, width }: SeenMarkProps) {
  const toTheRight = at < width / 2;
  return (
    <g>
      <path d={`M${at} ${base - 9}V${base}`} stroke="var(--color-ochre)" strokeWidth="2.5" />
      <text
        x={toTheRight ? at + 6 : at - 6}
        y={base - 4}
        textAnchor={toTheRight ? "start" : "end"}
        fontSize="12"
        fill="var(--color-ochre)"
      >
        {`${formatAsIs(seen)} seen: the total cannot be lower`}
      </text>
    </g>
  );
}

interface LimitsLineProps {
  readonly name: string;
  readonly note: string;
  readonly limits: Interval;
  readonly strong: boolean;
  readonly y: number;
  /** px from the line to its name. */
  readonly nameAt: number;
  readonly x: (value: number) => number;
  readonly middle: number;
  readonly ends: readonly [string, string];
}

function LimitsLine({ name, note, limits, strong, y, nameAt, x, middle, ends }: LimitsLineProps) {
  const [lower, upper] = [x(limits.lower), x(limits.upper)];
  const colour = strong ? "var(--color-act)" : "var(--color-ink-2)";
  const width = strong ? 2.75 : 1.5;
  return (
    <g>
      <text x="0" y={y + nameAt} fontSize="13" fontWeight="600" fill="var(--color-ink)">
        {name}
      </text>
      <text x={nameAt === 0 ? 0 : 84} y={nameAt === 0 ? y + 16 : y + nameAt} fontSize="12" fill="var(--color-ink-3)">
        {note}
      </text>
      <path
        d={`M${lower} ${y}H${upper}M${lower} ${y - 6}v12M${upper} ${y - 6}v12`}
        stroke={colour}
        strokeWidth={width}
        fill="none"
      />
      <circle cx={middle} cy={y} r={strong ? 5.5 : 4} fill="var(--color-paper)" stroke={colour} strokeWidth="2" />
      <text
        x={lower}
        y={y - 11}
        textAnchor="middle"
        fontSize="12"
        fontWeight={strong ? 700 : 400}
        fill="var(--color-ink)"
      >
        {ends[0]}
      </text>
      <text
        x={upper}
        y={y - 11}
        textAnchor="middle"
        fontSize="12"
        fontWeight={strong ? 700 : 400}
        fill="var(--color-ink)"
      >
        {ends[1]}
      </text>
    </g>
  );
}

function endsOf(result: EstimateResult, kind: "t" | "log-normal"): readonly [string, string] {
  const printed = printedLimitsOf(result, "total", kind);
  return printed === "none" ? ["", ""] : [printed.lower, printed.upper];
}

function axisText(result: EstimateResult): string {
  const said = (["log-normal", "t"] as const).flatMap((kind) => {
    const printed = printedLimitsOf(result, "total", kind);
    return printed === "none" ? [] : [`${NAMES[kind]} limits ${printed.lower} to ${printed.upper}`];
  });
  return `Total ${estimateText(result.total.estimate, result.total.standardError)}; ${said.join("; ")}; number seen ${formatAsIs(result.seen)}`;
}
