import { Problem } from "#shared/problem.ts";
import { sayError, UsageError } from "./usage.ts";

type Command = (args: readonly string[]) => Promise<number> | number;

/** Loaded when asked for: a command waits for nothing that it doesn't use. */
const COMMANDS: Readonly<Record<string, () => Promise<Command>>> = {
  grid: async () => (await import("./grid.ts")).grid,
  draw: async () => (await import("./draw.ts")).draw,
  estimate: async () => (await import("./estimate.ts")).estimate,
  replay: async () => (await import("./replay.ts")).replayRecord,
  "create-owner": async () => (await import("./create-owner.ts")).createOwner,
  backup: async () => (await import("./backup.ts")).backup,
  restore: async () => (await import("./restore.ts")).restore,
  check: async () => (await import("./check.ts")).check,
  demo: async () => (await import("./demo.ts")).demo,
};

const HELP = `Quillet without the browser. Results are JSON on stdout, refusals one line on stderr.

  grid --area FILE | --rings FILE  --crs EPSG:N --cell METRES [--height METRES] [--origin E,N]
       [--edge clip|centre|inside|share:P:inside|share:P:whole] [--leave-out CSV] [--list FILE] [--out FILE]
  draw --frame FILE --design srs-wr|srs-wor --n N --seed TEXT [--generator sha256-counter|arc4] [--reserves K]
  estimate --counts FILE.csv --design srs-wr|srs-wor --units N [--area M2] [--level 0.95] [--estimator expansion]
  replay RECORD.json [--hash HASH ...] [--fingerprint HASH] [--area FILE]
  create-owner --email ADDRESS --name NAME [--password PASSWORD]
  backup FILE            the whole installation in one file, also while it is served
  restore FILE           puts a backup in the place of the database, once it is found whole
  check                  walks database, chains and signatures, and replays every survey
  demo

Exit status: 0, 1 for a refusal or a check that fails, 2 for wrong usage.
`;

/** Runs one command; returns the exit status. */
export async function run(args: readonly string[]): Promise<number> {
  const [name, ...rest] = args;
  if (name === "--help" || name === "help") {
    process.stdout.write(HELP);
    return 0;
  }
  try {
    if (name === undefined) throw new UsageError("No command. Try: quillet --help");
    const load = Object.hasOwn(COMMANDS, name) ? COMMANDS[name] : undefined;
    if (load === undefined) throw new UsageError(`There is no command "${name}". Try: quillet --help`);
    const command = await load();
    return await command(rest);
  } catch (error) {
    if (error instanceof UsageError) {
      sayError(error.message);
      return 2;
    }
    if (error instanceof Problem) {
      sayError(`${error.code}: ${error.title}. ${error.message}`);
      return 1;
    }
    throw error;
  }
}
