const STEPS = [
  { id: "declare", name: "Declare" },
  { id: "seed", name: "Seed" },
  { id: "draw", name: "Draw" },
] as const;

/** Where the planner is on the way from nothing to a draw. */
export function DrawSteps({ at }: { readonly at: "declare" | "seed" }) {
  const done = STEPS.findIndex(({ id }) => id === at);
  return (
    <ol className="q-steps" aria-label="Order of proof">
      {STEPS.map(({ id, name }, index) => (
        <li
          key={id}
          data-state={index < done ? "done" : index === done ? "now" : "ahead"}
          aria-current={index === done ? "step" : undefined}
        >
          <span aria-hidden="true">{index + 1}</span> {name}
        </li>
      ))}
    </ol>
  );
}
