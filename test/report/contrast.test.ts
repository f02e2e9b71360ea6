import { describe, expect, it } from "vitest";
import { style } from "../../lib/report/style.ts";

/** Relative luminance and contrast ratio, WCAG 2.2 "relative luminance" and "contrast ratio". */
function luminance(color: string): number {
  const full = color.length === 4 ? color.replace(/[0-9a-f]/gi, "$&$&") : color;
  const [red, green, blue] = [1, 3, 5].map((at) => {
    const channel = Number.parseInt(full.slice(at, at + 2), 16) / 255;
    return channel <= 0.04045 ? channel / 12.92 : ((channel + 0.055) / 1.055) ** 2.4;
  });
  return 0.2126 * red + 0.7152 * green + 0.0722 * blue;
}
function contrast(one: string, other: string): number {
  const [light, dark] = [luminance(one), luminance(other)].sort((a, b) => b - a);
  return (light + 0.05) / (dark + 0.05);
}

const schemes = [...style.matchAll(/:root\{([^}]*)\}/g)].map(([, body]) =>
  Object.fromEntries([...body.matchAll(/--([\w-]+):(#[0-9a-f]+)/gi)].map((match) => [match[1], match[2]])),
);
const [light, dark] = schemes;

describe("the colours of the report", () => {
  it("are measured rightly: black on white is 21 to 1, and #777 on white just fails at 4.48", () => {
    // WCAG 2.2, Understanding SC 1.4.3.
    expect(contrast("#000000", "#ffffff")).toBeCloseTo(21, 5);
    expect(contrast("#777777", "#ffffff")).toBeCloseTo(4.48, 2);
  });

  for (const [name, scheme] of Object.entries({ light, dark })) {
    it(`${name}: text stands out from every ground it stands on, 4.5 to 1 (WCAG 2.2 SC 1.4.3)`, () => {
      for (const ground of ["paper", "card"]) {
        for (const text of ["ink", "soft", "water", "sand", "alarm"]) {
          expect(contrast(scheme[text], scheme[ground]), `${text} on ${ground}`).toBeGreaterThanOrEqual(4.5);
        }
      }
      expect(contrast(scheme.paper, scheme.ink)).toBeGreaterThanOrEqual(4.5);
    });

    it(`${name}: lines and marks stand out from every ground they cross, 3 to 1 (SC 1.4.11)`, () => {
      for (const line of ["water", "sand", "stone", "alarm"]) {
        expect(contrast(scheme[line], scheme.card), `${line} on card`).toBeGreaterThanOrEqual(3);
      }
      for (const fan of ["fan1", "fan2"])
        expect(contrast(scheme.sand, scheme[fan]), `forecast on ${fan}`).toBeGreaterThanOrEqual(3);
      for (const line of ["water", "stone"]) {
        expect(contrast(scheme[line], scheme["water-pale"]), `${line} on water-pale`).toBeGreaterThanOrEqual(
          3,
        );
        expect(contrast(scheme[line], scheme.grid), `${line} on grid`).toBeGreaterThanOrEqual(3);
      }
    });

    it(`${name}: the parts of a stack differ in lightness, so that grey print and colour-blind eyes tell them apart`, () => {
      const parts = ["p1", "p2", "p3", "p4"].map((one) => luminance(scheme[one]));
      for (let index = 1; index < parts.length; index++) {
        const [one, other] = [parts[index - 1], parts[index]].sort((a, b) => b - a);
        expect((one + 0.05) / (other + 0.05), `p${index} and p${index + 1}`).toBeGreaterThan(1.35);
      }
    });
  }
});
