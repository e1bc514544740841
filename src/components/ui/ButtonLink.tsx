import type { ReactNode } from "react";
import { Link } from "react-router-dom";
import { buttonClasses, type ButtonLook } from "./button-look.ts";

type ButtonLinkProps = ButtonLook & {
  readonly children: ReactNode;
  /** A page of the app. */
  readonly to?: string;
  /** Anything else: a file, an address of the API. */
  readonly href?: string;
  /** Saved under this name ("" keeps the server's). */
  readonly download?: string;
};

/** A link that looks like a button: it goes somewhere or fetches a file, and changes nothing. */
export function ButtonLink({ variant, size, children, to, href, download }: ButtonLinkProps) {
  const className = buttonClasses({ variant, size });
  const label = <span className="q-button-label">{children}</span>;
  if (to !== undefined) {
    return (
      <Link to={to} className={className}>
        {label}
      </Link>
    );
  }
  return (
    <a href={href} download={download} className={className}>
      {label}
    </a>
  );
}
