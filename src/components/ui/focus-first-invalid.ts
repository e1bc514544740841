/** Brings whoever sent a form that is not complete to the first control that says so. */
export function focusFirstInvalid(form: HTMLFormElement): void {
  form.querySelector<HTMLElement>("[aria-invalid='true']")?.focus();
}
