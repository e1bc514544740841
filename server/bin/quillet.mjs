import { pathToFileURL } from "node:url";
import { at, ensureBuilt, ensureInstalled, ensureNode } from "./setup.mjs";

ensureNode();
ensureInstalled();
ensureBuilt();
process.setSourceMapsEnabled(true);
await import(pathToFileURL(at("dist", "server", "quillet.js")).href);
