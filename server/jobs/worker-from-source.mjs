// In development and tests the worker runs from its source: a worker thread gets no TypeScript from its parent, so it asks for it.
import { register } from "tsx/esm/api";

register();
const { runTask } = await import("./worker.ts");
export { runTask };
