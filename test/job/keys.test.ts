import { describe, expect, it } from "vitest";
import { asOfFromKey, asOfKey, asOfText, tableNameFault, tableOfKey } from "../../lib/job/keys.ts";

describe("keys", () => {
  it("write an instant to the second, without colons, and read it back", () => {
    expect(asOfText("2026-11-30T06:00:00.000+00:00")).toBe("2026-11-30T06:00:00Z");
    expect(asOfKey("2026-11-30T06:00:00Z")).toBe("2026-11-30T06-00-00Z");
    expect(asOfFromKey("2026-11-30T06-00-00Z")).toBe("2026-11-30T06:00:00Z");
    expect(asOfFromKey("latest")).toBeUndefined();
  });

  it("refuse an instant that is none, naming it", () => {
    expect(() => asOfText("yesterday")).toThrow(/yesterday/);
  });

  it("take the table's name from its file, folders included", () => {
    expect(tableOfKey("series/north/loans.csv")).toBe("north/loans");
    expect(tableOfKey("series/loans.csv.gz")).toBe("loans");
    expect(tableOfKey("series/readme.md")).toBeUndefined();
  });

  it.each([
    "",
    "..",
    "a/../b",
    "a//b",
    ".",
    "/a",
    "a/",
    "a\u0000b",
    "a\\b",
    "a\u202eb",
    "x".repeat(201),
    "c:d",
    "a ",
  ])("refuse %j as a table name", (name) => expect(tableNameFault(name)).toBeDefined());

  it.each(["loans", "north/loans", "Zürich", "2026", "=SUM", "a b"])("take %j as a table name", (name) =>
    expect(tableNameFault(name)).toBeUndefined(),
  );
});
