import type { Mount } from "../http/mount.ts";
import { accountRoutes } from "./accounts.ts";
import { areaRoutes } from "./area.ts";
import { frameRoutes } from "./frame.ts";
import { countRoutes } from "./counts.ts";
import { drawRoutes } from "./draw.ts";
import { estimateRoutes } from "./estimate.ts";
import { fieldRoutes } from "./field.ts";
import { installationRoutes } from "./installation.ts";
import { peopleRoutes } from "./people.ts";
import { recordRoutes } from "./record.ts";
import { settingsRoutes } from "./settings.ts";
import { surveyRoutes } from "./surveys.ts";

/** Every route there is, in the order of the layer words. */
export function routes(mount: Mount): void {
  accountRoutes(mount);
  installationRoutes(mount);
  peopleRoutes(mount);
  surveyRoutes(mount);
  settingsRoutes(mount);
  areaRoutes(mount);
  frameRoutes(mount);
  drawRoutes(mount);
  fieldRoutes(mount);
  countRoutes(mount);
  estimateRoutes(mount);
  recordRoutes(mount);
}
