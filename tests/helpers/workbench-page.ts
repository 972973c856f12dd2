import axe from "axe-core";
import type { Browser, Locator, Page } from "playwright-core";
import { expect } from "vitest";

/** A page of the workbench that writes down what it asked for and what went wrong in it. */
export interface WorkbenchPage {
  readonly page: Page;
  /** Addresses of all requests, those of its workers too. */
  readonly requests: string[];
  /** Faults and breaches of the policy that the page reported. */
  readonly faults: string[];
}

/** Opens the workbench in a window of its own. */
export async function openWorkbench(
  browser: Browser,
  url: string,
  options: { colorScheme?: "light" | "dark"; width?: number; height?: number } = {},
): Promise<WorkbenchPage> {
  const { colorScheme = "light", width = 1366, height = 768 } = options;
  const context = await browser.newContext({ viewport: { width, height }, colorScheme, acceptDownloads: true });
  const requests: string[] = [];
  const faults: string[] = [];
  context.on("request", (request) => requests.push(request.url()));
  context.on("weberror", (error) => faults.push(error.error().message));
  context.on("console", (message) => {
    if (message.type() === "error") faults.push(message.text());
  });
  const page = await context.newPage();
  await page.goto(url);
  return { page, requests, faults };
}

/** Opens the demo and waits for its first picture. */
export async function openDemo(page: Page): Promise<void> {
  await page.getByRole("button", { name: "Open the demo" }).click();
  await page.locator("canvas[data-frame='0']").waitFor();
}

/** Measures what is on the bench and waits for the findings. */
export async function measure(page: Page): Promise<void> {
  await page.getByRole("button", { name: "Measure", exact: true }).click();
  await page.locator(".findings, .problem").first().waitFor({ timeout: 240_000 });
}

/** The line that says which frame is on show. */
export const frameLine = (page: Page): Locator => page.locator(".transport .where");

/** What a person reads in an element. */
// biome-ignore lint/performance/useDomNodeTextContent: what is hidden must not count
export const textOf = (element: Locator): Promise<string> => element.innerText();

/** Drops files or folders of this machine onto the middle of the page, as a person would. */
export async function dropOnto(page: Page, paths: string[]): Promise<void> {
  const session = await page.context().newCDPSession(page);
  const data = { items: [], files: paths, dragOperationsMask: 1 };
  for (const type of ["dragEnter", "dragOver", "drop"] as const) {
    await session.send("Input.dispatchDragEvent", { type, x: 600, y: 400, data });
  }
}

/** Fails with what is wrong when the page has a serious or critical fault of accessibility. */
export async function expectAccessible(page: Page): Promise<void> {
  // Evaluated by the debugger, which no policy of the page hinders.
  await page.evaluate(axe.source);
  const found = await page.evaluate(async () => {
    const { violations } = await (window as unknown as { axe: typeof axe }).axe.run();
    return violations
      .filter(({ impact }) => impact === "serious" || impact === "critical")
      .map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html).join(" | ")}`);
  });
  expect(found).toEqual([]);
}
