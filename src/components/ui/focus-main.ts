/** Gives the focus to the page's content where what had it is gone; whoever goes on by key or by ear goes on from there. */
export function focusMain(): void {
  if (document.activeElement === null || document.activeElement === document.body)
    document.getElementById("main")?.focus({ preventScroll: true });
}
