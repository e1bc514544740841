import { cleanup } from "@testing-library/react";
import { afterEach, vi } from "vitest";

// jsdom lays nothing out: lists that keep only the rows in sight read a height, and observers exist but never report.
Object.defineProperty(HTMLElement.prototype, "clientHeight", { configurable: true, get: () => 560 });
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

vi.stubGlobal("ResizeObserver", SilentObserver);
Element.prototype.scrollIntoView = () => undefined;
Element.prototype.hasPointerCapture = () => false;
HTMLElement.prototype.scrollTo = () => undefined;

afterEach(() => {
  cleanup();
});
