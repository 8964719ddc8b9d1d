/** Opens the page with a small case that settles at once, and reads its state: for browser tests. */
import { expect } from "@playwright/test";
import type { Locator, Page } from "@playwright/test";
import AxeBuilder from "@axe-core/playwright";
import type { CaseDocument } from "../../src/case/types.ts";

/** A short quenched bar; all values are invented. */
export const QUICK: CaseDocument = {
  corelag: 1,
  title: "Quick bar",
  part: {
    regions: [
      {
        name: "bar",
        material: "steel",
        outline: [
          { at: [0, 0], side: "foot" },
          { at: ["30 mm", 0], side: "wall" },
          { at: ["30 mm", "80 mm"], side: "head" },
          { at: [0, "80 mm"], side: "axis" },
        ],
      },
    ],
  },
  materials: { steel: { density: 7800, conductivity: 28, heatCapacity: 620, source: "invented" } },
  start: "850 degC",
  stages: [{ name: "Oil", lasts: "600 s", ambient: "60 degC", sides: { "*": { film: 900 } } }],
  probes: [{ name: "middle", at: [0, "40 mm"] }],
  questions: [{ ask: "when", where: "every-point", reaches: "300 degC" }, { ask: "spread" }, { ask: "heat" }],
  accuracy: 0.02,
};

/** The page with the case on the sheet and its answers settled. */
export async function openQuick(page: Page, document: CaseDocument = QUICK): Promise<void> {
  await page.goto("./");
  await page.waitForFunction(() => window.document.querySelector("corelag-app") !== null);
  await page.evaluate((opened) => appState().open(opened as never), document as unknown as object);
  await settle(page);
}

export async function settle(page: Page): Promise<void> {
  await page.waitForFunction(() => {
    const state = appState();
    return state.status.value === "settled" && !state.stale.value;
  });
}

export async function documentOf(page: Page): Promise<CaseDocument> {
  return page.evaluate(() => appState().document.value as never);
}

export async function cursorOf(page: Page): Promise<number> {
  return page.evaluate(() => appState().cursor.value);
}

/** No fault of accessibility inside one element of the page. */
export async function expectAccessible(page: Page, selector: string): Promise<void> {
  const { violations } = await new AxeBuilder({ page })
    .include({ fromShadowDom: ["corelag-app", selector] })
    .analyze();
  expect(
    violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.target.join(" ")).join("; ")}`),
  ).toEqual([]);
}

/** Middle of an element on the page. */
export async function middleOf(locator: Locator): Promise<{ x: number; y: number }> {
  const box = await locator.boundingBox();
  if (box === null) throw new Error("the element is not on the page");
  return { x: box.x + box.width / 2, y: box.y + box.height / 2 };
}

interface Signal<Value> {
  value: Value;
}
interface State {
  open(document: never): void;
  readonly document: Signal<unknown>;
  readonly status: Signal<string>;
  readonly stale: Signal<boolean>;
  readonly cursor: Signal<number>;
}
declare global {
  /** made by the init script below */
  function appState(): State;
}

/** Makes `appState()` known to the page; called before the page is opened. */
export async function nameState(page: Page): Promise<void> {
  await page.addInitScript(() => {
    globalThis.appState = () =>
      (window.document.querySelector("corelag-app") as unknown as { state: State }).state;
  });
}
