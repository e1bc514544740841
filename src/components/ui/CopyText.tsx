import { useEffect, useState, type ReactNode } from "react";

interface CopyTextProps {
  /** What goes to the clipboard. */
  readonly text: string;
  /** What it is, for the button's name: "frame hash". */
  readonly label: string;
  /** What is shown; the text itself when nothing is given. */
  readonly children?: ReactNode;
}

/** Text that a click copies; says "copied" beside it, or that the browser refused. */
export function CopyText({ text, label, children }: CopyTextProps) {
  const [said, setSaid] = useState("");
  useEffect(() => {
    if (said === "") return undefined;
    const timer = setTimeout(() => setSaid(""), 2500);
    return () => clearTimeout(timer);
  }, [said]);
  const copy = () => {
    navigator.clipboard.writeText(text).then(
      () => setSaid("copied"),
      () => setSaid("the browser did not allow it"),
    );
  };
  return (
    <>
      <button type="button" className="q-copy" title={text} aria-label={`Copy ${label}: ${text}`} onClick={copy}>
        {children ?? text}
      </button>
      <span role="status" className={said === "" ? "sr-only" : "ml-2 text-note text-ink-3"}>
        {said}
      </span>
    </>
  );
}
