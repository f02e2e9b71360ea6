import { describe, expect, it } from "vitest";
import { deliver } from "../../lib/webhook/deliver.ts";
import { receiver } from "../support/receiver.ts";

describe("deliver", () => {
  it("posts the body once, signed, and is done at 200", async () => {
    const hook = await receiver();
    const outcome = await deliver({
      address: hook.address,
      body: '{"text":"hello"}',
      contentType: "application/json; charset=utf-8",
      id: "msg_1",
      keys: [],
      deadlineMilliseconds: Date.now() + 5_000,
      clock: Date.now,
      allowLocal: true,
    });
    expect(outcome).toEqual({ delivered: true, posts: 1, status: 200 });
    expect(hook.received).toHaveLength(1);
    expect(hook.received[0]!.body).toBe('{"text":"hello"}');
  });
});
