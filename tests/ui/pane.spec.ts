import { readFile } from "node:fs/promises";
import { expect, test } from "@playwright/test";
import { unzipSync } from "fflate";
import { expectAccessible, nameState, openQuick } from "../helpers/quickPage.ts";

test.beforeEach(async ({ page }) => {
  await nameState(page);
  await openQuick(page);
});

test("the words of the pane are tabs, walked with the arrow keys", async ({ page }) => {
  await page.getByRole("tab", { name: "Answers" }).focus();
  await page.keyboard.press("ArrowRight");
  await expect(page.getByRole("tab", { name: "Proof" })).toBeFocused();
  await expect(page.getByRole("tabpanel", { name: "Proof" })).toContainText("sharpest corner");
  await page.keyboard.press("End");
  await expect(page.getByRole("tabpanel", { name: "Hand-over" })).toBeVisible();
});

test("the proof is accessible and says what was kept", async ({ page }) => {
  await page.getByRole("tab", { name: "Proof" }).click();
  await expect(page.getByText(/no value outside 60\s°C to 850\s°C/)).toBeVisible();
  await expect(page.locator("corelag-proof .broken")).toHaveCount(0);
  await expectAccessible(page, "corelag-pane");
});

test("the mesh is laid over the section and taken off again, its shapes told as bars and in words", async ({
  page,
}) => {
  await page.getByRole("tab", { name: "Proof" }).click();
  await expect(
    page.getByRole("img", { name: /Sharpest corner of each triangle.*the worst has \d+/ }),
  ).toBeVisible();
  const overlay = page.locator("corelag-section canvas.mesh");
  await expect(overlay).toHaveCount(0);
  await page.getByRole("button", { name: "Lay the mesh over the section" }).click();
  await expect(overlay).toHaveCount(1);
  const inked = await overlay.evaluate((canvas: HTMLCanvasElement) => {
    const { data } = canvas.getContext("2d")!.getImageData(0, 0, canvas.width, canvas.height);
    return data.reduce((count, value, i) => count + (i % 4 === 3 && value > 0 ? 1 : 0), 0);
  });
  expect(inked).toBeGreaterThan(2000);
  await page.getByRole("button", { name: "Take the mesh off the section" }).click();
  await expect(overlay).toHaveCount(0);
});

test("curves are saved as CSV, named after the case", async ({ page }) => {
  await page.getByRole("tab", { name: "Hand-over" }).click();
  await expectAccessible(page, "corelag-pane");
  const saving = page.waitForEvent("download");
  await page.getByRole("button", { name: "Save: Curves" }).click();
  const file = await saving;
  expect(file.suggestedFilename()).toBe("quick-bar-curves.csv");
  const text = await readFile(await file.path(), "utf8");
  expect(text.split("\n")[0]).toContain("time_s,core_degC");
});

test("snapshots come with the series that names their times", async ({ page }) => {
  await page.getByRole("tab", { name: "Hand-over" }).click();
  const saving = page.waitForEvent("download");
  await page.getByRole("button", { name: "Save: Field snapshots" }).click();
  const files = unzipSync(new Uint8Array(await readFile(await (await saving).path())));
  const names = Object.keys(files);
  expect(names.filter((name) => name.endsWith(".pvd"))).toEqual(["quick-bar.pvd"]);
  expect(names.filter((name) => name.endsWith(".vtu")).length).toBeGreaterThan(10);
});

test("the section is saved as a picture: field in colours, drawing over it", async ({ page }) => {
  await page.getByRole("tab", { name: "Hand-over" }).click();
  const saving = page.waitForEvent("download");
  await page.getByRole("button", { name: "Save: Section picture" }).click();
  const file = await saving;
  expect(file.suggestedFilename()).toMatch(/\.png$/);
  const bytes = await readFile(await file.path());
  const facts = await page.evaluate(async (text) => {
    const bitmap = await createImageBitmap(new Blob([Uint8Array.from(atob(text), (c) => c.charCodeAt(0))]));
    const canvas = new OffscreenCanvas(bitmap.width, bitmap.height);
    const pen = canvas.getContext("2d")!;
    pen.drawImage(bitmap, 0, 0);
    const { data } = pen.getImageData(0, 0, bitmap.width, bitmap.height);
    let [coloured, dark] = [0, 0];
    for (let i = 0; i < data.length; i += 4) {
      const three = [data[i]!, data[i + 1]!, data[i + 2]!];
      if (Math.max(...three) - Math.min(...three) > 50) coloured++;
      if (data[i]! + data[i + 1]! + data[i + 2]! < 120) dark++;
    }
    return { width: bitmap.width, height: bitmap.height, coloured, dark };
  }, bytes.toString("base64"));
  expect(facts.width).toBeGreaterThan(1500);
  expect(facts.coloured).toBeGreaterThan(0.05 * facts.width * facts.height);
  expect(facts.dark).toBeGreaterThan(1000);
});

test("results of an earlier case cannot be handed over", async ({ page }) => {
  await page.getByRole("tab", { name: "Hand-over" }).click();
  await page.evaluate(() => {
    const state = appState() as unknown as { edit(label: string, recipe: (draft: never) => void): void };
    state.edit("density", (draft: { materials: { steel: { density: number } } }) => {
      draft.materials.steel.density = -1;
    });
  });
  await expect(page.getByRole("button", { name: "Save: Curves" })).toBeDisabled();
  await expect(page.getByRole("button", { name: "Save: Case file" })).toBeEnabled();
  await expect(page.getByText("Results can be saved once the case on the sheet is sound")).toBeVisible();
});

test("an empty sheet tells three things to know", async ({ page }) => {
  await page.evaluate(() => (appState() as unknown as { clear(): void }).clear());
  await expect(page.getByRole("heading", { name: "Three things to know" })).toBeVisible();
  await expectAccessible(page, "corelag-pane");
  await page.getByRole("button", { name: "Look at a solved ingot" }).click();
  await expect(page.getByRole("article").first()).toBeVisible();
});
