import { ensureBuilt, ensureInstalled, ensureNode } from "./setup.mjs";

ensureNode();
ensureInstalled();
ensureBuilt();
