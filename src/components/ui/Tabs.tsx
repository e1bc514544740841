import { Tabs as Radix } from "radix-ui";
import type { ReactNode } from "react";

export interface Tab {
  readonly id: string;
  /** With its number: "Picks 60". */
  readonly label: ReactNode;
  readonly content: ReactNode;
}

interface TabsProps {
  /** What the tabs are views of, for screen readers. */
  readonly label: string;
  readonly tabs: readonly Tab[];
  readonly value?: string;
  readonly onChange?: (id: string) => void;
  /** At the right of the tabs: "in draw order". */
  readonly note?: ReactNode;
}

/** Views of the same thing. Arrows move between them. */
export function Tabs({ label, tabs, value, onChange, note }: TabsProps) {
  const first = tabs[0]?.id ?? "";
  const control = value === undefined ? { defaultValue: first } : { value };
  return (
    <Radix.Root {...control} {...(onChange !== undefined && { onValueChange: onChange })}>
      <div className="q-tabs">
        <Radix.List aria-label={label} className="contents">
          {tabs.map((tab) => (
            <Radix.Trigger key={tab.id} value={tab.id} className="q-tab">
              {tab.label}
            </Radix.Trigger>
          ))}
        </Radix.List>
        {note !== undefined && <span className="q-tabs-note">{note}</span>}
      </div>
      {tabs.map((tab) => (
        <Radix.Content key={tab.id} value={tab.id}>
          {tab.content}
        </Radix.Content>
      ))}
    </Radix.Root>
  );
}
