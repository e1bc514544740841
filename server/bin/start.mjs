import { pathToFileURL } from "node:url";
import { at, ensureBuilt, ensureInstalled, ensureNode, root } from "./setup.mjs";

ensureNode();
ensureInstalled();
ensureBuilt();
process.chdir(root);
process.env.NODE_ENV ??= "production";
process.setSourceMapsEnabled(true);
await import(pathToFileURL(at("dist", "server", "main.js")).href);
