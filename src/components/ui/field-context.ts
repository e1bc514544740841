import { createContext, use } from "react";

/** What a Field tells the control inside it: its id and what describes it. */
export interface FieldIds {
  readonly id: string;
  readonly describedBy: string | undefined;
  readonly invalid: boolean;
}

export const FieldContext = createContext<FieldIds | null>(null);

/** The attributes that tie a control to the Field around it; a control without a Field gets none and brings its own label. */
export function useFieldAttributes(): { id?: string; "aria-describedby"?: string; "aria-invalid"?: true } {
  const field = use(FieldContext);
  if (field === null) return {};
  return {
    id: field.id,
    ...(field.describedBy !== undefined && { "aria-describedby": field.describedBy }),
    ...(field.invalid && { "aria-invalid": true as const }),
  };
}
