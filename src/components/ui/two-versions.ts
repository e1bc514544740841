/** One thing that two people may have set differently. */
export interface ComparedField<T> {
  readonly key: keyof T & string;
  readonly label: string;
  /** As it is shown to be chosen; two values that read alike are alike. */
  readonly text: (values: T) => string;
}

/** What was there when the writing began, what is written here, and what somebody else has kept meanwhile. */
export interface TwoOf<T> {
  readonly seen: T;
  readonly mine: T;
  readonly theirs: T;
}

export type Choice = "theirs" | "mine";

export interface Difference {
  readonly key: string;
  readonly label: string;
  readonly theirs: string;
  readonly mine: string;
  /** Whose it is where only one of the two changed it; null where both did, and somebody has to say. */
  readonly obvious: Choice | null;
}

/** The fields in which the two versions differ, in their order. */
export function differencesOf<T>(fields: readonly ComparedField<T>[], { seen, mine, theirs }: TwoOf<T>): Difference[] {
  return fields.flatMap(({ key, label, text }) => {
    const [before, here, there] = [text(seen), text(mine), text(theirs)];
    if (here === there) return [];
    const obvious = here === before ? "theirs" : there === before ? "mine" : null;
    return { key, label, theirs: there, mine: here, obvious } satisfies Difference;
  });
}

/** Their version, with mine in the fields where that was chosen. */
export function mergedBy<T>(
  fields: readonly ComparedField<T>[],
  { mine, theirs }: Pick<TwoOf<T>, "mine" | "theirs">,
  choices: Readonly<Partial<Record<string, Choice>>>,
): T {
  const merged = { ...theirs };
  for (const { key } of fields) if (choices[key] === "mine") merged[key] = mine[key];
  return merged;
}
