import { accessSync, constants } from "node:fs";
import { delimiter, join } from "node:path";
import { type Browser, chromium, type Page } from "playwright-core";

const names = ["chromium", "chromium-browser", "google-chrome", "google-chrome-stable", "chrome"];

/** The first Chromium on the PATH. */
function findBrowser(): string | undefined {
  const places = (process.env.PATH ?? "")
    .split(delimiter)
    .flatMap((folder) => names.map((name) => join(folder, name)));
  return places.find((place) => {
    try {
      accessSync(place, constants.X_OK);
      return true;
    } catch {
      return false;
    }
  });
}

export const browserPath = findBrowser();
if (!browserPath) console.warn("SKIPPED: no Chromium on the PATH, so no page is looked at in a browser.");

export function openBrowser(): Promise<Browser> {
  return chromium.launch({ executablePath: browserPath, args: ["--no-sandbox", "--disable-gpu"] });
}

/** Opens a page from text, with every section laid out as if it had been scrolled to. */
export async function openPage(
  browser: Browser,
  markup: string,
  look: { readonly width: number; readonly scheme: "light" | "dark" },
): Promise<Page> {
  const context = await browser.newContext({
    viewport: { width: look.width, height: 900 },
    colorScheme: look.scheme,
  });
  const page = await context.newPage();
  await page.setContent(markup);
  await page.addStyleTag({ content: ".series{content-visibility:visible !important}" });
  return page;
}
