import { CopyText } from "./CopyText.tsx";

/** A recipe to be copied and run elsewhere. */
export function CodeBlock({ code, label }: { readonly code: string; readonly label: string }) {
  return (
    <figure>
      <pre className="q-code" tabIndex={0} aria-label={label}>
        {code}
      </pre>
      <figcaption className="mt-1 text-small">
        <CopyText text={code} label={label}>
          Copy it
        </CopyText>
      </figcaption>
    </figure>
  );
}
