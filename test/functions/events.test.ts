import { readdirSync } from "node:fs";
import { describe, expect, it } from "vitest";
import {
  closingRequest,
  EventError,
  portionRequest,
  scheduledRequest,
} from "../../functions/cloud/events.ts";
import { sampleEvent } from "./testCloud.ts";

const now = new Date("2026-12-01T09:30:15.250Z");

describe("an event", () => {
  it("has a sample for every kind of invocation", () => {
    const samples = readdirSync("events").filter((name) => name.endsWith(".json"));
    expect(samples.sort()).toEqual([
      "by-hand.json",
      "closing.json",
      "portion.json",
      "scheduled.json",
      "watch.json",
    ]);
  });

  it("of the schedule names the run by the time it was due", () => {
    expect(scheduledRequest(sampleEvent("scheduled"), now)).toEqual({
      kind: "run",
      asOf: "2026-11-30T06:00:00Z",
    });
  });

  it("by hand may say now", () => {
    expect(scheduledRequest(sampleEvent("by-hand"), now)).toEqual({
      kind: "run",
      asOf: "2026-12-01T09:30:15Z",
    });
  });

  it("of the watch says how long is too long", () => {
    expect(scheduledRequest(sampleEvent("watch"), now)).toEqual({ kind: "watch", withinHours: 336 });
  });

  it("for a worker brings the tables of its portions in one list", () => {
    expect(portionRequest(sampleEvent("portion"))).toEqual({
      asOf: "2026-11-30T06:00:00Z",
      tables: ["desk-calls", "loans", "members"],
    });
    const two = {
      BatchInput: { asOf: "2026-11-30T06:00:00Z" },
      Items: [{ tables: ["a"] }, { tables: ["b", "c"] }],
    };
    expect(portionRequest(two).tables).toEqual(["a", "b", "c"]);
  });

  it("for closing names the run, when its fleet started and why it was the fleet's", () => {
    expect(closingRequest(sampleEvent("closing"))).toEqual({
      asOf: "2026-11-30T06:00:00Z",
      startedAt: "2026-11-30T06:00:04Z",
      because: "chosen for this deployment",
    });
  });

  it.each([
    [null, /needs a JSON object/],
    [[], /needs a JSON object/],
    [{}, /asOf must be an ISO instant/],
    [{ asOf: "2026-11-30" }, /with its zone/],
    [{ asOf: "2026-11-30T06:00:00" }, /with its zone/],
    [{ asOf: "<aws.scheduler.scheduled-time>" }, /asOf must be/],
    [{ watch: { withinHours: "many" } }, /withinHours, a number/],
    [{ watch: { withinHours: 0 } }, /above 0/],
  ])("that no function understands is refused with what was expected: %j", (event, message) => {
    expect(() => scheduledRequest(event, now)).toThrow(EventError);
    expect(() => scheduledRequest(event, now)).toThrow(message);
  });

  it.each([
    [{ BatchInput: {}, Items: [] }, /asOf/],
    [{ BatchInput: { asOf: "2026-11-30T06:00:00Z" }, Items: "all" }, /Items, a list/],
    [{ BatchInput: { asOf: "2026-11-30T06:00:00Z" }, Items: [{ tables: [7] }] }, /tables, a list of names/],
  ])("for a worker with a part missing is refused: %j", (event, message) => {
    expect(() => portionRequest(event)).toThrow(message);
  });
});
