import { describe, expect, it } from "vitest";
import { jsonLog } from "../../functions/cloud/log.ts";
import { secretsOf } from "../../functions/cloud/secrets.ts";

function reading(text: string | undefined, environment = {}) {
  const lines: string[] = [];
  let reads = 0;
  const log = jsonLog(
    (line) => lines.push(line),
    () => 0,
    { runId: "r" },
  );
  const secrets = secretsOf(
    async () => {
      reads++;
      return text;
    },
    environment,
    log,
  );
  return { secrets, lines, reads: () => reads };
}

describe("a reference", () => {
  it("to the secret gives the value of that name, read once an invocation", async () => {
    const { secrets, reads } = reading('{"CHAT": " https://chat.example/hook\\n", "KEY": "whsec_abc"}');
    expect(await secrets("secret:CHAT")).toBe("https://chat.example/hook");
    expect(await secrets("secret:KEY")).toBe("whsec_abc");
    expect(reads()).toBe(1);
  });

  it("to the environment reads it, but none of Lambda's own credentials", async () => {
    const { secrets, reads } = reading("{}", { CHAT: "https://chat.example", AWS_SECRET_ACCESS_KEY: "x" });
    expect(await secrets("env:CHAT")).toBe("https://chat.example");
    expect(await secrets("env:AWS_SECRET_ACCESS_KEY")).toBeUndefined();
    expect(reads()).toBe(0);
  });

  it.each(["]kD3#generated-at-first-deploy", "", "null", "[1]", '"https://chat.example"', undefined])(
    "to a secret that holds no JSON object (%j) gives nothing, and the log says so without the text",
    async (text) => {
      const { secrets, lines } = reading(text);
      expect(await secrets("secret:CHAT")).toBeUndefined();
      expect(lines[0]).toContain("nothing is delivered until it does");
      if (text) expect(lines.join()).not.toContain(text.slice(1, 12) || "never");
    },
  );

  it("to a name the secret does not hold gives nothing, and the log names it", async () => {
    const { secrets, lines } = reading('{"OTHER": "https://secret.example/path"}');
    expect(await secrets("secret:CHAT")).toBeUndefined();
    expect(JSON.parse(lines[0])).toMatchObject({ level: "WARN", name: "CHAT", runId: "r" });
    expect(lines.join()).not.toContain("secret.example");
  });

  it("fails when the secret cannot be read, so that the run is tried again and no message is lost", async () => {
    const log = jsonLog(
      () => undefined,
      () => 0,
      {},
    );
    const secrets = secretsOf(() => Promise.reject(new Error("throttled")), {}, log);
    await expect(secrets("secret:CHAT")).rejects.toThrow("throttled");
  });
});
