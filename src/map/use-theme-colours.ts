import { useEffect, useState } from "react";

function read<Name extends string>(names: Readonly<Record<Name, `--${string}`>>): Readonly<Record<Name, string>> {
  const style = getComputedStyle(document.documentElement);
  return Object.fromEntries(
    Object.entries<string>(names).map(([name, property]) => [name, style.getPropertyValue(property).trim()]),
  ) as Record<Name, string>;
}

/** Colours of the style sheet for a canvas, read again whenever the theme on the root changes. `names` must stay the same object. */
export function useThemeColours<Name extends string>(
  names: Readonly<Record<Name, `--${string}`>>,
): Readonly<Record<Name, string>> {
  const [colours, setColours] = useState(() => read(names));
  useEffect(() => {
    const observer = new MutationObserver(() => setColours(read(names)));
    observer.observe(document.documentElement, { attributes: true, attributeFilter: ["data-theme"] });
    return () => observer.disconnect();
  }, [names]);
  return colours;
}
