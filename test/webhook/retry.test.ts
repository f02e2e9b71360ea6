import { describe, expect, it } from "vitest";
import { retryAfter } from "../../lib/webhook/retryAfter.ts";
import { type PostResult, retryDecision } from "../../lib/webhook/retryDecision.ts";

const answer = (status: number, retryAfterMilliseconds?: number): PostResult => ({
  kind: "answer",
  status,
  retryAfterMilliseconds,
});
const wait = (result: PostResult, count: number, left: number, id = "msg_1") => {
  const decision = retryDecision(result, count, left, id);
  return decision.action === "wait" ? decision.milliseconds : decision.action;
};

describe("retryAfter", () => {
  // The three forms of one date in RFC 9110, 5.6.7, and the examples of 10.2.3.
  const named = Date.UTC(1994, 10, 6, 8, 49, 37);

  it.each([
    ["120", 120_000],
    ["0", 0],
    [" 5 ", 5_000],
    ["0.35", 350],
    ["Sun, 06 Nov 1994 08:49:37 GMT", 60_000],
    ["Sunday, 06-Nov-94 08:49:37 GMT", 60_000],
    ["Sun Nov  6 08:49:37 1994", 60_000],
    ["Sun, 06 Nov 1994 08:40:00 GMT", 0],
  ])("reads %j", (header, milliseconds) => {
    expect(retryAfter(header, named - 60_000)).toBe(milliseconds);
  });

  it.each([undefined, "", "-5", "1.5.2", ".5", "soon", "1e9", "12345678901", "Sun, 99 Foo 1994", "5 s"])(
    "ignores %j",
    (header) => {
      expect(retryAfter(header, named)).toBeUndefined();
    },
  );

  it("does not depend on the time zone of the machine", () => {
    const before = process.env.TZ;
    try {
      for (const zone of ["Asia/Kolkata", "America/Los_Angeles", "UTC"]) {
        process.env.TZ = zone;
        expect(retryAfter("Sun Nov  6 08:49:37 1994", named - 1_000)).toBe(1_000);
      }
    } finally {
      if (before === undefined) delete process.env.TZ;
      else process.env.TZ = before;
    }
  });
});

describe("retryDecision", () => {
  it("every status has the decision its class asks for", () => {
    for (let status = 200; status < 600; status++) {
      const { action } = retryDecision(answer(status), 1, 60_000, "msg_1");
      const again = [408, 425, 429].includes(status) || status >= 500;
      expect(action, String(status)).toBe(status < 300 ? "done" : again ? "wait" : "stop");
    }
  });

  it("404 and 410 alone mean gone", () => {
    for (let status = 300; status < 600; status++) {
      const decision = retryDecision(answer(status), 1, 60_000, "msg_1");
      if (decision.action === "stop")
        expect(decision.gone, String(status)).toBe(status === 404 || status === 410);
    }
  });

  it("waits what Retry-After asks, and at most what leaves time for a last post", () => {
    expect(wait(answer(429, 7_000), 1, 60_000)).toBe(7_000);
    expect(wait(answer(503, 0), 1, 60_000)).toBe(0);
    expect(wait(answer(429, 3_600_000), 1, 60_000)).toBe(58_000);
    expect(wait(answer(429, 3_600_000), 1, 4_000)).toBe(3_000);
  });

  it("without Retry-After doubles from half a second, a quarter more at most, up to thirty seconds", () => {
    for (let count = 1; count < 8; count++) {
      const base = Math.min(30_000, 500 * 2 ** (count - 1));
      const waited = wait(answer(500), count, 1e9) as number;
      expect(waited).toBeGreaterThanOrEqual(base);
      expect(waited).toBeLessThanOrEqual(base * 1.25);
    }
  });

  it("is the same every time for one message and differs between messages", () => {
    expect(wait(answer(500), 3, 1e9)).toBe(wait(answer(500), 3, 1e9));
    const waits = new Set(Array.from({ length: 50 }, (_, i) => wait(answer(500), 3, 1e9, `msg_${i}`)));
    expect(waits.size).toBeGreaterThan(25);
  });

  it("stops after eight posts, when no time is left, and at faults that last", () => {
    const fault = (lasting: boolean): PostResult => ({
      kind: "fault",
      reason: "closed the connection",
      lasting,
    });
    expect(wait(answer(500), 8, 1e9)).toBe("stop");
    expect(wait(answer(429, 1), 2, 199)).toBe("stop");
    expect(wait(fault(true), 1, 1e9)).toBe("stop");
    expect(wait(fault(false), 1, 1e9)).toBeTypeOf("number");
  });
});
