import { describe, expect, it } from "vitest";
import { createTileQueue } from "../../../src/map/tile-queue.ts";

/** A clock and frames that move by hand. */
function byHand() {
  let time = 0;
  const frames: (() => void)[] = [];
  const ran: string[] = [];
  const queue = createTileQueue(
    8,
    (callback) => frames.push(callback),
    () => time,
  );
  return {
    queue,
    ran,
    add: (name: string, takes: number, wanted = true) =>
      queue.add({
        wanted: () => wanted,
        run: () => {
          time += takes;
          ran.push(name);
        },
      }),
    frame: () => frames.shift()?.(),
    waiting: () => frames.length,
  };
}

describe("the queue of tiles", () => {
  it("works at most 8 ms a frame and goes on in the next", () => {
    const { add, ran, frame, waiting } = byHand();
    for (const name of ["a", "b", "c", "d", "e"]) add(name, 4);
    expect(ran).toEqual([]);
    expect(waiting()).toBe(1);
    frame();
    expect(ran).toEqual(["a", "b"]);
    frame();
    frame();
    expect(ran).toEqual(["a", "b", "c", "d", "e"]);
    expect(waiting()).toBe(0);
  });

  it("a tile that takes longer than a frame still comes, one a frame", () => {
    const { add, ran, frame } = byHand();
    add("long", 30);
    add("next", 1);
    frame();
    expect(ran).toEqual(["long"]);
    frame();
    expect(ran).toEqual(["long", "next"]);
  });

  it("drops what nobody looks at any more, at no cost", () => {
    const { add, ran, frame, queue } = byHand();
    add("gone", 4, false);
    add("seen", 4);
    frame();
    expect(ran).toEqual(["seen"]);
    add("cleared", 1);
    queue.clear();
    frame();
    expect(ran).toEqual(["seen"]);
  });

  it("takes work that comes while it works", () => {
    const { queue, ran, frame } = byHand();
    queue.add({ wanted: () => true, run: () => queue.add({ wanted: () => true, run: () => ran.push("second") }) });
    frame();
    frame();
    expect(ran).toEqual(["second"]);
  });
});
