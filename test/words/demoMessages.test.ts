import { mkdtemp, readdir, readFile, rm } from "node:fs/promises";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { demoTruths } from "../../events/demo/truths.ts";
import { readMessage } from "../../lib/job/readBack.ts";
import { replayRuns } from "../../lib/job/replay.ts";
import { openStore } from "../../lib/store/openStore.ts";
import type { Message } from "../../lib/webhook/message.ts";

// demoMessages.txt was read line by line and agreed to: it holds what the demo's readers are told over 16 weeks, and
// is here so that a change of wording or numbers is seen and read again, not because our own output proved itself.
// After such a reading, write it anew with `npx vitest run --config test/vitest.config.ts --root . test/words/demoMessages -u`.

describe("the messages of the demo's 16 weeks", () => {
  const messages: Message[] = [];
  let folder = "";

  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), "demo-messages-"));
    const store = openStore(folder);
    await store.create("settings.json", await readFile("events/demo/settings.json"));
    for (const name of await readdir("events/demo/series"))
      await store.create(`series/${name}`, await readFile(join("events/demo/series", name)));
    const until = new Date(demoTruths.asOf);
    const from = new Date(until.getTime() - 15 * 7 * 86_400_000);
    for (const { asOf } of await replayRuns({ store, from, until, every: "week" })) {
      const message = await readMessage(store, asOf, "business");
      if (message) messages.push(message);
    }
  }, 600_000);
  afterAll(() => rm(folder, { recursive: true, force: true }));

  it("are those that were read and agreed to", async () => {
    const text = messages.map(({ title, lines }) => [title, ...lines].join("\n")).join("\n\n");
    await expect(`${text}\n`).toMatchFileSnapshot("./demoMessages.txt");
  });

  it("are one a week, short, and each says what to expect", () => {
    expect(messages).toHaveLength(16);
    for (const { lines } of messages) {
      expect(lines.length).toBeLessThanOrEqual(13);
      for (const line of lines) expect([...line].length).toBeLessThanOrEqual(160);
      expect(lines.filter((line) => / in the week of | on \w+day /.test(line)).length).toBeGreaterThanOrEqual(
        4,
      );
    }
  });

  it("tell Quay's change, and Station's one odd week as a surprise and never as a lasting change", () => {
    const all = messages.flatMap(({ lines }) => lines);
    expect(all.some((line) => /Quay: shocks now lose half their effect in about \d+ weeks/.test(line))).toBe(
      true,
    );
    expect(all.some((line) => /Station: .* more than expected: a one-off so far/.test(line))).toBe(true);
    const lasting =
      /: (shocks (now|no longer)|the usual level (is|hardly)|the trend changed|surprises are|the repeating pattern)/;
    expect(all.filter((line) => lasting.test(line) && !/Quay/.test(line))).toEqual([]);
  });
});
