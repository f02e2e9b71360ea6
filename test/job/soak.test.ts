import { execFile } from "node:child_process";
import { promisify } from "node:util";
import { describe, expect, it } from "vitest";
import { bundle } from "../support/bundle.ts";
import { receiver } from "../support/receiver.ts";
import { temporaryFolder } from "../support/temporaryFolder.ts";
import { hookOf } from "../support/tinyRun.ts";

const runs = 300;
/** Without the optimising compilers, whose code lies in the same heap and grows for a long while. */
const flags = ["--expose-gc", "--no-opt", "--no-sparkplug"];

describe("one process", () => {
  it(`runs the job ${runs} times without its heap growing by what even the kept names of its objects would take`, async () => {
    const hook = await receiver();
    const program = await bundle("test/support/soakChild.ts");
    const { stdout } = await promisify(execFile)(
      process.execPath,
      [...flags, program, await temporaryFolder(), hookOf(hook.port, "soak"), String(runs)],
      { timeout: 600_000 },
    );
    const heaps = stdout
      .trim()
      .split("\n")
      .map((line) => (JSON.parse(line) as NodeJS.MemoryUsage).heapUsed);
    expect(heaps).toHaveLength(runs / 20);
    expect(hook.received).toHaveLength(runs);
    // Warm after 100 runs. Over the next 200, the names alone of the objects that a run touches, kept by mistake,
    // would take more than 1 kB a run.
    const growth = heaps.at(-1)! - heaps[4]!;
    console.info(
      `heap after ${runs} runs ${(heaps.at(-1)! / 1e6).toFixed(1)} MB, ${(growth / 1e3).toFixed(0)} kB more than after 100`,
    );
    expect(growth).toBeLessThan(200_000);
  }, 600_000);
});
