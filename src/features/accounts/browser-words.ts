/** What comes first decides: several browsers name others along with themselves. */
const BROWSERS: readonly (readonly [RegExp, string])[] = [
  [/\bEdg(e|A|iOS)?\//, "Edge"],
  [/\b(OPR|Opera)\//, "Opera"],
  [/\bSamsungBrowser\//, "Samsung Internet"],
  [/\b(Firefox|FxiOS)\//, "Firefox"],
  [/\bChromium\//, "Chromium"],
  [/\b(Chrome|HeadlessChrome|CriOS)\//, "Chrome"],
  [/\bVersion\/.*\bSafari\//, "Safari"],
  [/\bcurl\//, "curl"],
];

const SYSTEMS: readonly (readonly [RegExp, string])[] = [
  [/\biPhone\b/, "an iPhone"],
  [/\biPad\b/, "an iPad"],
  [/\bAndroid\b/, "Android"],
  [/\bWindows\b/, "Windows"],
  [/\bCrOS\b/, "ChromeOS"],
  [/\bMac OS X\b|\bMacintosh\b/, "a Mac"],
  [/\bLinux\b/, "Linux"],
];

function first(of: readonly (readonly [RegExp, string])[], userAgent: string): string | null {
  return of.find(([pattern]) => pattern.test(userAgent))?.[1] ?? null;
}

/** A browser in words, as far as it names itself: "Firefox on Linux". */
export function browserWords(userAgent: string): string {
  const browser = first(BROWSERS, userAgent);
  const system = first(SYSTEMS, userAgent);
  if (browser === null && system === null) return "a browser that does not say which";
  return `${browser ?? "A browser"}${system === null ? "" : ` on ${system}`}`;
}
