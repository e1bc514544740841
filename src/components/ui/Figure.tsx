interface FigureProps {
  /** A formatted number ("2 926", "3.948"), or a word where there is none. */
  readonly children: string;
  /** The most decimals in this column: the fraction stands in a box of that width, so that decimals stand under decimals. */
  readonly decimals: number;
}

/** A number in a right-aligned column whose rows have different numbers of decimals. */
export function Figure({ children, decimals }: FigureProps) {
  const point = children.indexOf(".");
  const whole = point < 0 ? children : children.slice(0, point);
  return (
    <>
      {whole}
      {decimals > 0 && (
        <span className="q-fraction" style={{ width: `${decimals + 1}ch` }}>
          {point < 0 ? "" : children.slice(point)}
        </span>
      )}
    </>
  );
}
