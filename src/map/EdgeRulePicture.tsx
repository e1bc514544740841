/** Which of the nine cells of the picture belong: columns and rows from the upper left. */
const CELLS = {
  clip: ["00", "10", "01", "11", "21", "02", "12", "22"],
  centre: ["00", "01", "11", "02", "12", "22"],
  inside: ["01", "02", "12"],
} as const;

/** What an edge rule does at a boundary: the cells that belong are tinted, under clip only inside. */
export function EdgeRulePicture({
  rule,
  size = 42,
}: {
  readonly rule: "clip" | "centre" | "inside";
  readonly size?: number;
}) {
  return (
    <svg width={size} height={size} viewBox="0 0 48 48" aria-hidden="true" className="flex-none">
      {rule === "clip" ? (
        <path d="M0 5.6C14 3 22 16 26 24S40 34 48 33.2V48H0Z" fill="var(--color-act)" opacity=".24" />
      ) : (
        CELLS[rule].map((cell) => (
          <rect
            key={cell}
            x={Number(cell[0]) * 16}
            y={Number(cell[1]) * 16}
            width="16"
            height="16"
            fill="var(--color-act)"
            opacity=".24"
          />
        ))
      )}
      <path
        d="M0 0h48v48H0zM16 0v48M32 0v48M0 16h48M0 32h48"
        fill="none"
        stroke="var(--color-rule-2)"
        strokeWidth=".7"
      />
      {rule === "centre" &&
        ["00", "10", "20", "01", "11", "21", "02", "12", "22"].map((cell) => {
          const inside = (CELLS.centre as readonly string[]).includes(cell);
          return (
            <circle
              key={cell}
              cx={Number(cell[0]) * 16 + 8}
              cy={Number(cell[1]) * 16 + 8}
              r={inside ? 2 : 1.2}
              fill={inside ? "var(--color-act)" : "var(--color-ink-3)"}
            />
          );
        })}
      <path d="M-2 6C14 3 22 16 26 24S40 34 50 33" fill="none" stroke="var(--color-ink)" strokeWidth="1.75" />
    </svg>
  );
}
