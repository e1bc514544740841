import { DropdownMenu } from "radix-ui";
import type { ReactNode } from "react";
import { Link } from "react-router-dom";

export type MenuItem =
  | {
      readonly kind: "act";
      readonly label: string;
      readonly onSelect: () => void;
      readonly danger?: boolean;
      readonly disabled?: boolean;
    }
  | { readonly kind: "link"; readonly label: string; readonly to: string }
  | { readonly kind: "rule" };

interface MenuProps {
  /** The button that opens it. */
  readonly trigger: ReactNode;
  readonly items: readonly MenuItem[];
}

function entry(item: MenuItem, index: number) {
  switch (item.kind) {
    case "rule":
      return <DropdownMenu.Separator key={index} className="q-menu-rule" />;
    case "link":
      return (
        <DropdownMenu.Item key={index} asChild>
          <Link className="q-menu-item" to={item.to}>
            {item.label}
          </Link>
        </DropdownMenu.Item>
      );
    case "act":
      return (
        <DropdownMenu.Item
          key={index}
          className="q-menu-item"
          data-tone={item.danger === true ? "danger" : undefined}
          disabled={item.disabled === true}
          onSelect={item.onSelect}
        >
          {item.label}
        </DropdownMenu.Item>
      );
  }
}

/** A short list of acts and links behind one button; arrows, letters and Escape work in it. */
export function Menu({ trigger, items }: MenuProps) {
  return (
    <DropdownMenu.Root>
      <DropdownMenu.Trigger asChild>{trigger}</DropdownMenu.Trigger>
      <DropdownMenu.Portal>
        <DropdownMenu.Content className="q-menu" align="end" sideOffset={4} collisionPadding={8}>
          {items.map(entry)}
        </DropdownMenu.Content>
      </DropdownMenu.Portal>
    </DropdownMenu.Root>
  );
}
