import { scaleBar } from "./sheet-lines.ts";

/** A bar of a round length, dark and light in turn, with its figures. */
export function ScaleBar({
  scale,
  widest,
  parts,
}: {
  readonly scale: number;
  readonly widest: number;
  readonly parts: number;
}) {
  const bar = scaleBar(scale, widest);
  const part = bar.px / parts;
  return (
    <svg className="q-sheet-scale" width={bar.px + 64} height="20" role="img" aria-label={`Scale bar of ${bar.label}`}>
      {Array.from({ length: parts }, (_, index) => (
        <rect
          key={index}
          x={12 + index * part}
          y="13.5"
          width={part}
          height="5"
          fill={index % 2 === 0 ? "var(--color-ink)" : "var(--color-paper)"}
          stroke="var(--color-ink)"
          strokeWidth="0.8"
        />
      ))}
      <text x="12" y="9.5">
        0
      </text>
      {parts > 1 && (
        <text x={12 + bar.px / 2} y="9.5">
          {bar.half}
        </text>
      )}
      <text x={12 + bar.px} y="9.5">
        {bar.label}
      </text>
    </svg>
  );
}
