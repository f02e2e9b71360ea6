import { describe, expect, it } from "vitest";
import type { ChangeNotice } from "../../lib/drift/notice.ts";
import { readWatch } from "../../lib/drift/storedWatch.ts";
import { type Watch, type WatchResult, watchSeries } from "../../lib/drift/watchSeries.ts";
import { withR } from "../support/r.ts";
import { simulatedSeries } from "./simulatedSeries.ts";

const r = withR();
const settings = { looks: 52, falseAlarmRate: 0.05, seed: 1, trend: false, season: 0 };

/** Runs at each of the given lengths, the watch stored as JSON and read back in between. */
function runs(values: readonly number[], lengths: readonly number[]): WatchResult[] {
  let previous: Watch | undefined;
  return lengths.map((length) => {
    const result = watchSeries(previous, values.slice(0, length), settings);
    const read = readWatch(JSON.parse(JSON.stringify(result.watch)));
    if ("unreadable" in read) throw new Error(read.unreadable);
    previous = read.watch;
    return result;
  });
}

const upTo = (from: number, to: number) => Array.from({ length: to - from + 1 }, (_, i) => from + i);
const changesOf = (results: readonly WatchResult[]) =>
  results.flatMap(({ notices }) => notices).filter((one): one is ChangeNotice => one.code === "change");

describe("watchSeries", () => {
  const stepped = simulatedSeries({ seed: 12, length: 300, coefficient: 0.4, changeAt: 180, level: 5 });

  it("waits for sixty values before it makes a reference", () => {
    const states = runs(stepped, upTo(50, 62)).map(({ state }) => state);
    expect(states.slice(0, 10)).toEqual(new Array(10).fill("waiting-for-data"));
    expect(states.at(-1)).toBe("watching");
  });

  it("relearns after a change until forty values make a fresh reference, then watches that", () => {
    const results = runs(stepped, upTo(156, 260));
    const [first, second] = changesOf(results);
    expect([first.kind, second.status]).toEqual(["level", "confirmed"]);
    expect(Math.abs(second.change.index - 180)).toBeLessThanOrEqual(1);
    const changed = second.change.index;
    const stateAt = (length: number) => results[length - 156].state;
    expect(stateAt(first.noticedAt)).toBe("watching");
    expect(stateAt(first.noticedAt + 1)).toBe("relearning");
    expect(stateAt(changed + 39)).toBe("relearning");
    expect(stateAt(changed + 40)).toBe("watching");
    expect(results.at(-1)?.changedAt).toBe(changed);
    expect(results.at(-1)?.watch.monitor?.reference.length).toBe(40);
    expect(changesOf(results).length).toBe(2);
  });

  it("gives the same notices in one run as in many", () => {
    const many = runs(stepped, upTo(156, 260));
    const few = runs(stepped, [156, 163, 260]);
    expect(few.flatMap(({ notices }) => notices)).toEqual(many.flatMap(({ notices }) => notices));
    expect(few.at(-1)?.watch).toEqual(many.at(-1)?.watch);
  });

  it("takes a fresh reference when the looks are used up", () => {
    const steady = simulatedSeries({ seed: 4, length: 300, coefficient: 0.4 });
    const results = runs(steady, [156, 207, 208, 209]);
    expect(results.map(({ watch }) => watch.monitor?.looksUsed)).toEqual([0, 51, 0, 1]);
    expect(results.at(-1)?.watch.monitorStart).toBe(208 - 156);
  });

  it("says nothing new of values it has seen, revised or not", () => {
    const [, once] = runs(stepped, [156, 200]);
    const revised = stepped.slice(0, 200).map((value, at) => (at < 150 ? value + 50 : value));
    const again = watchSeries(once.watch, revised, settings);
    expect(again.notices).toEqual([]);
    expect(again.watch).toEqual(once.watch);
  });

  it("counts on when old values are dropped from the front", () => {
    const [, whole] = runs(stepped, [156, 200]);
    const [start] = runs(stepped, [156]);
    const cut = watchSeries(start.watch, stepped.slice(30, 200), { ...settings, firstIndex: 30 });
    expect(cut.watch).toEqual(whole.watch);
    const places = (result: WatchResult) => changesOf([result]).map(({ change }) => change.index);
    expect(places(cut)).toEqual(places(whole).map((index) => index - 30));
  });

  it("finds at first sight that the Nile changed in 1899 and makes no reference across it", async () => {
    const nile = await r.evaluate("datasets::Nile");
    const { pastBreak, watch, changedAt } = watchSeries(undefined, nile, settings);
    expect(1871 + (pastBreak?.index ?? 0)).toBe(1899);
    expect(pastBreak?.levelBefore).toBeCloseTo(1097.75, 6); // strucchange 1.5.3, segment means
    expect(pastBreak?.levelAfter).toBeCloseTo(849.972222222, 6);
    expect(changedAt).toBe(28);
    expect(watch.monitor?.reference.length).toBe(72);
  });

  // A steady series brings a notice in a year of looks with probability 0.05: of 38 pieces more than six do so with
  // probability 0.003 (R: pbinom(6, 38, 0.05, lower.tail = FALSE)).
  it("keeps to its budget on pieces of the tree rings of Campito Mountain", async () => {
    const rings = await r.evaluate("datasets::treering");
    const pieces = Array.from({ length: 38 }, (_, piece) => rings.slice(piece * 208, (piece + 1) * 208));
    const noticed = pieces.filter((piece) => changesOf(runs(piece, [156, 208])).length > 0);
    expect(noticed.length).toBeLessThanOrEqual(6);
  });

  it("brings no notice on the hormone series lh nor on yearly differences of nhtemp", async () => {
    const lh = await r.evaluate("datasets::lh");
    const differences = await r.evaluate("diff(datasets::nhtemp)");
    expect(changesOf(runs([...lh, ...lh.toReversed()], [60, 96]))).toEqual([]);
    expect(changesOf(runs([...differences, ...differences.toReversed()], [60, 112]))).toEqual([]);
  });
});

describe("readWatch", () => {
  it("tells what it cannot read and takes nothing for a first sight", () => {
    expect(readWatch(undefined)).toEqual({ watch: undefined });
    expect(readWatch(null)).toEqual({ watch: undefined });
    expect(readWatch({ schema: "watch", version: 2 })).toEqual({
      unreadable: "the stored watch has version 2; this program reads version 1",
    });
    expect(readWatch({ schema: "watch", version: 1, state: "asleep" })).toMatchObject({
      unreadable: expect.stringContaining("state"),
    });
  });
});
