import { expect, test } from "@playwright/test";
import type { Page } from "@playwright/test";
import { documentOf, expectAccessible, nameState, openQuick, QUICK, settle } from "../helpers/quickPage.ts";

test.beforeEach(async ({ page }) => nameState(page));

async function newPart(page: Page): Promise<void> {
  await page.getByRole("button", { name: "More", exact: true }).click();
  await page.getByRole("menuitem", { name: "New part" }).click();
  await expect(page.getByRole("heading", { name: "What do you heat or cool?" })).toBeVisible();
}

test("the first sheet is accessible, before and after a shape is picked", async ({ page }) => {
  await openQuick(page);
  await newPart(page);
  await expectAccessible(page, "corelag-start");
  await expectAccessible(page, "corelag-head");
  await page.getByRole("button", { name: /^Ring/ }).click();
  await expectAccessible(page, "corelag-start");
});

test("a ring from its typed sizes, in mixed units, is laid on the sheet and answered", async ({ page }) => {
  await openQuick(page);
  await newPart(page);
  await page.getByRole("button", { name: /^Ring/ }).click();
  const type = async (label: string, value: string): Promise<void> => {
    const entry = page.getByLabel(label);
    await entry.fill(value);
    await entry.press("Enter");
  };
  await type("Bore, mm", "100");
  await type("Outside diameter, mm", "8 in");
  await type("Width, mm", "50");
  await type("start temperature, °C", "400");
  await page.getByRole("button", { name: "Lay it on the sheet" }).click();
  const { part, start } = await documentOf(page);
  expect(part.regions[0]!.outline.map((vertex) => vertex.at)).toEqual([
    [0.05, 0],
    [0.1016, 0],
    [0.1016, 0.05],
    [0.05, 0.05],
  ]);
  expect(start).toBe("400 °C");
  await settle(page);
  await expect(page.locator("corelag-pane output").first()).toHaveText(/\d/);
});

test("sizes that cannot be are told, and nothing is laid", async ({ page }) => {
  await openQuick(page);
  await newPart(page);
  await page.getByRole("button", { name: /^Ring/ }).click();
  const bore = page.getByLabel("Bore, mm");
  await bore.fill("400");
  await bore.press("Enter");
  await expect(page.getByText("The bore is not smaller than the outside diameter.")).toBeVisible();
  await expect(page.getByRole("button", { name: "Lay it on the sheet" })).toBeDisabled();
});

test("a new part loses nothing: undo brings the case back", async ({ page }) => {
  await openQuick(page);
  await newPart(page);
  await page.getByRole("button", { name: "Undo: new part" }).click();
  expect((await documentOf(page)).title).toBe("Quick bar");
  await settle(page);
});

test("the bundled case is solved when the page opens for the first time", async ({ page }) => {
  await page.goto("./");
  await page.waitForFunction(() => window.document.querySelector("corelag-app") !== null);
  await settle(page);
  expect((await documentOf(page)).title).toBe("Tapered ingot, stripped and air cooled");
  await expect(page.getByText("kept on this machine")).toBeVisible();
});

test("a reload brings back the case as edited, and the units", async ({ page }) => {
  await openQuick(page);
  const title = page.getByLabel("title of the case");
  await title.fill("Bar of the day");
  await title.press("Enter");
  await page.getByRole("button", { name: "in °F" }).click();
  await page.waitForTimeout(500);
  await page.reload();
  await page.waitForFunction(() => window.document.querySelector("corelag-app") !== null);
  expect((await documentOf(page)).title).toBe("Bar of the day");
  await expect(page.getByRole("button", { name: "in °F" })).toHaveAttribute("aria-pressed", "true");
  await expect(page).toHaveTitle("Corelag: Bar of the day");
});

const file = (name: string, text: string) => ({
  name,
  mimeType: "application/json",
  buffer: Buffer.from(text),
});
const pick = (page: Page, name: string, text: string): Promise<void> =>
  page.locator("corelag-head input[type=file]").setInputFiles(file(name, text));

test("a case saved to a file opens again as it was", async ({ page }) => {
  await openQuick(page);
  const [download] = await Promise.all([
    page.waitForEvent("download"),
    page.getByRole("button", { name: "Save the case to a file" }).click(),
  ]);
  expect(download.suggestedFilename()).toBe("quick-bar.json");
  const { readFileSync } = await import("node:fs");
  const text = readFileSync((await download.path())!, "utf8");
  expect(JSON.parse(text)).toEqual(QUICK);
  await newPart(page);
  await pick(page, "quick-bar.json", text);
  expect(await documentOf(page)).toEqual(QUICK);
  await settle(page);
});

test("a file that is no case is told in one line, and the sheet stays", async ({ page }) => {
  await openQuick(page);
  await pick(page, "broken.json", '{ "corelag": 1, "title": }');
  await expect(page.getByText(/^broken\.json was not opened\. Line 1, column 2\d/)).toBeVisible();
  await pick(page, "newer.json", '{ "corelag": 7 }');
  await expect(page.getByText(/newer\.json was not opened.*version 7/)).toBeVisible();
  await pick(page, "shopping.json", '["milk"]');
  await expect(
    page.getByText(/^shopping\.json was not opened\. This is not a case document\./),
  ).toBeVisible();
  expect((await documentOf(page)).title).toBe("Quick bar");
  await page.getByRole("button", { name: "Close" }).click();
  await expect(page.getByText(/was not opened/)).toBeHidden();
});

const FAULTY: readonly (readonly [what: string, change: (text: string) => string, tells: RegExp])[] = [
  ["a point that is no number", (text) => text.replace('"30 mm",0', '"wide",0'), /wide/],
  ["a radius below zero", (text) => text.replace('"30 mm",0', '"-30 mm",0'), /axis|below|negative|r /i],
  ["a material that is missing", (text) => text.replace('"material":"steel"', '"material":"brass"'), /brass/],
  ["a unit of the wrong kind", (text) => text.replace('"850 degC"', '"850 kg"'), /a mass/],
  [
    "a probe outside the part",
    (text) => text.replace('[0,"40 mm"]', '["90 mm","40 mm"]'),
    /outside the part/,
  ],
  ["a side without length", (text) => text.replace('["30 mm",0]', "[0,0]"), /length|one place|same/i],
];
for (const [what, change, tells] of FAULTY)
  test(`a case with ${what} is laid down with its fault marked, and can be taken back`, async ({ page }) => {
    await openQuick(page);
    const text = JSON.stringify(QUICK);
    expect(change(text)).not.toBe(text);
    await pick(page, "faulty.json", change(text));
    const card = page.getByRole("alert", { name: "Fault" });
    await expect(card).toContainText(tells);
    await expect(page.getByText(/^waiting/)).toBeVisible();
    await expectAccessible(page, "corelag-section");
    await card.getByRole("button", { name: /^Undo: opening/ }).click();
    await settle(page);
    expect((await documentOf(page)).title).toBe("Quick bar");
  });

test("a gap to the axis is told with its size and closed at once", async ({ page }) => {
  await openQuick(page);
  await pick(page, "gap.json", JSON.stringify(QUICK).replace('[0,"80 mm"]', '["0.4 mm","80 mm"]'));
  const card = page.getByRole("alert", { name: "Fault" });
  await expect(card).toContainText(/gap of 0\.4\smm to the axis/);
  await card.getByRole("button", { name: "Close the gap" }).click();
  await settle(page);
  await expect(card).toBeHidden();
});
