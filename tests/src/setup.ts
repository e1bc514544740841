import { cleanup } from "@testing-library/react";
import { afterEach, vi } from "vitest";

// jsdom lays nothing out: lists that keep only the rows in sight read a height, and observers exist but never report.
Object.defineProperty(HTMLElement.prototype, "clientHeight", { configurable: true, get: () => 560 });
Object.defineProperty(HTMLElement.prototype, "clientWidth", { configurable: true, get: () => 800 });
Object.defineProperty(HTMLElement.prototype, "offsetHeight", { configurable: true, get: () => 560 });
Object.defineProperty(HTMLElement.prototype, "offsetWidth", { configurable: true, get: () => 800 });

class SilentObserver {
  observe(): void {
    // nothing to watch without layout
  }
  unobserve(): void {
    // nothing to watch without layout
  }
  disconnect(): void {
    // nothing to watch without layout
  }
}

/** As CSS.escape for the ids and names that React makes: every character but letters, digits, _ and - gets a backslash. */
vi.stubGlobal("CSS", { escape: (text: string) => text.replaceAll(/[^\w-]/g, "\\$&") });
// Assigned, not stubbed: it outlives the tests that take their own stubs away.
globalThis.ResizeObserver = SilentObserver;
Element.prototype.scrollIntoView = () => undefined;
Element.prototype.hasPointerCapture = () => false;
HTMLElement.prototype.scrollTo = () => undefined;
window.scrollTo = () => undefined;

afterEach(() => {
  cleanup();
});
