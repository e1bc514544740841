import type { Mount } from "../http/mount.ts";
import { accountRoutes } from "./accounts.ts";
import { surveyRoutes } from "./surveys.ts";

/** Every route there is, in the order of the layer words. */
export function routes(mount: Mount): void {
  accountRoutes(mount);
  surveyRoutes(mount);
}
