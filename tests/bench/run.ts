import { benchFrame } from "./frame.ts";

/** Measures Quillet beside general libraries, in one run, and prints a table of ratios. */
const rows = await benchFrame();
process.stdout.write("| work | Quillet, ms | beside | its ms | ratio |\n|---|---|---|---|---|\n");
for (const row of rows) {
  const beside = row.beside
    ? `${row.beside.name} | ${row.beside.ms.toFixed(1)} | ${(row.beside.ms / row.ms).toFixed(0)}`
    : "– | – | –";
  process.stdout.write(`| ${row.name} | ${row.ms.toFixed(2)} | ${beside} |\n`);
}
