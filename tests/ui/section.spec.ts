import { expect, test } from "@playwright/test";
import type { Page } from "@playwright/test";
import {
  documentOf,
  expectAccessible,
  middleOf,
  nameState,
  openQuick,
  settle,
} from "../helpers/quickPage.ts";
import { fieldColour, middleOfPoint, pointName, spotOf } from "../helpers/sectionPage.ts";

test.beforeEach(async ({ page }) => {
  await nameState(page);
  await openQuick(page);
});

const place = async (page: Page, index: number): Promise<unknown> =>
  (await documentOf(page)).part.regions[0]!.outline[index]!.at;

test("the section is accessible: nothing, a side, a point and a probe selected", async ({ page }) => {
  await expectAccessible(page, "corelag-section");
  for (const name of [/^Wall, side 2/, /^Point 3/, /^Probe middle/]) {
    await page.getByRole("button", { name }).focus();
    await page.keyboard.press("Tab"); // from here on the focus counts as shown
    await page.keyboard.press("Shift+Tab");
    await expect(page.getByRole("complementary", { name: "Selected" })).toBeVisible();
    await expectAccessible(page, "corelag-section");
  }
});

test("the section is accessible on the dark sheet and in forced colours", async ({ page }) => {
  await page.emulateMedia({ colorScheme: "dark" });
  await expect(page.locator("html")).toHaveAttribute("data-theme", "dark");
  await expectAccessible(page, "corelag-section");
  await page.emulateMedia({ forcedColors: "active" });
  await expectAccessible(page, "corelag-section");
});

test("everything on the sheet has its name", async ({ page }) => {
  await expect(
    page.getByRole("group", {
      name: "Section of the bar, right half editable. 4 points, 3 sides, 1 probe.",
    }),
  ).toBeVisible();
  await expect(page.getByRole("button", { name: "Point 3, wall to head, r 30.0, z 80.0 mm" })).toBeVisible();
  await expect(page.getByRole("button", { name: "Wall, side 2, oil 60 °C, film 900" })).toBeVisible();
  await expect(page.locator("corelag-section .heard")).toHaveText(
    /^At .+ from [\d.]+\s°C .+ to [\d.]+\s°C .+ mm\.$/,
  );
});

test("the field carries the map's colour of the temperature at each place", async ({ page }) => {
  const { expected, painted } = await fieldColour(page, 0.01, 0.04);
  for (let k = 0; k < 3; k++) expect(Math.abs(painted[k]! - expected[k]!)).toBeLessThanOrEqual(4);
});

test("the pointer reads the temperature and the place", async ({ page }) => {
  const spot = await spotOf(page, 0.012, 0.04);
  await page.mouse.move(spot.x, spot.y);
  await expect(page.locator("corelag-section .readout")).toHaveText(/[\d.]+\s°C\s+r 1[12]\.\d z (39|40)\.\d/);
});

test("a point follows the hand in whole millimetres, as one step of undo", async ({ page }) => {
  const from = await middleOf(pointName(page, 3));
  await page.mouse.move(from.x, from.y);
  await page.mouse.down();
  for (let i = 1; i <= 8; i++) await page.mouse.move(from.x + 2 * i, from.y);
  await page.mouse.up();
  const [r, z] = (await place(page, 2)) as [string, string];
  expect(r).toMatch(/^3\d mm$/);
  expect(Number.parseFloat(r)).toBeGreaterThan(30);
  expect(z).toBe("80 mm");
  await settle(page);
  await page.getByRole("button", { name: "Undo: move of point 3" }).click();
  expect(await place(page, 2)).toEqual(["30 mm", "80 mm"]);
});

test("Escape puts a dragged point back", async ({ page }) => {
  const from = await middleOf(pointName(page, 3));
  await page.mouse.move(from.x, from.y);
  await page.mouse.down();
  await page.mouse.move(from.x + 20, from.y - 10, { steps: 4 });
  expect(await place(page, 2)).not.toEqual(["30 mm", "80 mm"]);
  await page.keyboard.press("Escape");
  expect(await place(page, 2)).toEqual(["30 mm", "80 mm"]);
  await page.mouse.up();
  expect(await place(page, 2)).toEqual(["30 mm", "80 mm"]);
  await expect(page.getByRole("button", { name: "Undo: opening of Quick bar" })).toBeVisible();
});

test("the view stands still under a press, and the dragged point stays under the pointer", async ({
  page,
}) => {
  const from = await middleOfPoint(page, 3);
  await page.mouse.move(from.x, from.y);
  await page.mouse.down();
  await page.waitForTimeout(400);
  const held = await middleOfPoint(page, 3);
  expect(Math.hypot(held.x - from.x, held.y - from.y)).toBeLessThan(1);
  await page.mouse.move(from.x + 24, from.y, { steps: 3 });
  const moved = await middleOfPoint(page, 3);
  expect(Math.abs(moved.x - from.x - 24)).toBeLessThan(4);
  await page.mouse.up();
});

test("arrow keys move a point by 1, 10 and 0.1 mm; N goes to the next point", async ({ page }) => {
  await pointName(page, 3).focus();
  await page.keyboard.press("ArrowRight");
  await page.keyboard.press("Shift+ArrowUp");
  await page.keyboard.press("Alt+ArrowUp");
  expect(await place(page, 2)).toEqual(["31 mm", "90.1 mm"]);
  await page.keyboard.press("n");
  await expect(pointName(page, 4)).toBeFocused();
  await page.keyboard.press("p");
  await expect(pointName(page, 3)).toBeFocused();
});

test("a coordinate is typed in any unit, and a wrong one is told where it stands", async ({ page }) => {
  await pointName(page, 3).focus();
  await page.keyboard.press("ArrowRight");
  await page.keyboard.press("Enter");
  const entry = page.getByLabel("r of point 3, mm");
  await entry.fill("1 1/4 in");
  await entry.press("Enter");
  expect(((await place(page, 2)) as string[])[0]).toBe("1 1/4 in");
  await expect(entry).toHaveValue("31.8");
  await entry.fill("2 kg");
  await entry.press("Enter");
  await expect(page.getByRole("alert").filter({ hasText: "a mass" })).toBeVisible();
  expect(((await place(page, 2)) as string[])[0]).toBe("1 1/4 in");
});

test("a side moves square to itself", async ({ page }) => {
  const grip = await spotOf(page, 0.03, 0.03);
  await page.mouse.move(grip.x, grip.y);
  await page.mouse.down();
  await page.mouse.move(grip.x + 15, grip.y + 9, { steps: 4 });
  await page.mouse.up();
  const [a, b] = (await Promise.all([place(page, 1), place(page, 2)])) as [string, unknown][];
  expect(Number.parseFloat(a![0])).toBeGreaterThan(30);
  expect(b![0]).toBe(a![0]);
  expect(a![1]).toBe(0);
  expect(b![1]).toBe("80 mm");
});

test("tools: a point is set by a click on the outline, a side bent, a probe set and named", async ({
  page,
}) => {
  await page.getByRole("button", { name: "Insert a point" }).click();
  await expect(page.getByText("Click the outline where the new point should stand.")).toBeVisible();
  const on = await spotOf(page, 0.03, 0.05);
  await page.mouse.click(on.x, on.y);
  expect((await documentOf(page)).part.regions[0]!.outline).toHaveLength(5);
  await expect(page.getByRole("heading", { name: /^Point 3/ })).toBeVisible();

  await page.getByRole("button", { name: "Bend a side into an arc" }).click();
  expect((await documentOf(page)).part.regions[0]!.outline[2]!.through).toBeDefined();
  await expect(page.getByLabel(/^rise of wall over its chord/)).toBeVisible();

  await page.getByRole("button", { name: "Set a probe" }).click();
  const inside = await spotOf(page, 0.015, 0.02);
  await page.mouse.click(inside.x, inside.y);
  const name = page.getByLabel("name of the probe");
  await name.fill("quarter");
  await name.press("Enter");
  const { probes } = await documentOf(page);
  expect(probes!.map((probe) => probe.name)).toEqual(["middle", "quarter"]);
  await settle(page);
  await expect(page.locator("corelag-tag .gives")).toHaveText(/Now [\d.]+\s°C\./);
});

test("tools act at once from the keyboard, and Delete takes a point out", async ({ page }) => {
  await page.getByRole("button", { name: /^Wall, side 2/ }).focus();
  await page.keyboard.press("ArrowRight"); // selects by moving: 1 mm outwards
  await page.keyboard.press("i");
  expect((await documentOf(page)).part.regions[0]!.outline).toHaveLength(5);
  await page.keyboard.press("Delete");
  expect((await documentOf(page)).part.regions[0]!.outline).toHaveLength(4);
});

test("a side is insulated and gets its own film, by words and blanks", async ({ page }) => {
  const head = await spotOf(page, 0.015, 0.08);
  await page.mouse.click(head.x, head.y);
  const tag = page.getByRole("complementary", { name: "Selected" });
  await expect(tag).toBeVisible();
  await tag.getByRole("button", { name: "Insulate" }).click();
  expect((await documentOf(page)).stages[0]!.sides["head"]).toBe("insulated");
  await expect(page.getByRole("button", { name: "Head, side 3, insulated" })).toBeVisible();
  await settle(page);
  await tag.getByRole("button", { name: "As the other sides" }).click();
  const film = tag.getByLabel(/^film of head/);
  await film.fill("200");
  await film.press("Enter");
  expect((await documentOf(page)).stages[0]!.sides["head"]).toEqual({ film: "200 W/(m² K)" });
  await settle(page);
});

test("an outline that crosses itself is marked at its place, answers stay, and the card mends it", async ({
  page,
}) => {
  const from = await middleOfPoint(page, 3);
  const across = await spotOf(page, 0.012, -0.03);
  await page.mouse.move(from.x, from.y);
  await page.mouse.down();
  await page.mouse.move(across.x, across.y, { steps: 6 });
  await page.mouse.up();
  const card = page.getByRole("alert", { name: "Fault" });
  await expect(card).toContainText("The outline crosses itself here");
  await expect(page.getByText("waiting for a sound outline")).toBeVisible();
  await expect(page.locator("corelag-section .fault-ring").first()).toBeVisible();
  await expect(page.locator("corelag-pane output").first()).toBeVisible();
  await expectAccessible(page, "corelag-section");
  await card.getByRole("button", { name: "Put point 3 back" }).click();
  await expect(card).toBeHidden();
  await settle(page);
});

test("a side without a condition says so on the sheet, and one is picked for it there", async ({ page }) => {
  await page.evaluate(() => {
    interface Editing {
      edit(label: string, recipe: (draft: { stages: { sides: object }[] }) => void): void;
    }
    (appState() as unknown as Editing).edit("taking the film off", (draft) => {
      draft.stages[0]!.sides = { foot: "insulated", wall: { film: 900 } };
    });
  });
  const card = page.getByRole("alert", { name: "Fault" });
  await expect(card).toContainText("A side needs a condition");
  await expect(page.getByRole("button", { name: "Head, side 3, needs a condition" })).toBeVisible();
  await card.getByRole("button", { name: "Pick one for it" }).click();
  await page
    .getByRole("complementary", { name: "Selected" })
    .getByRole("button", { name: "Insulate" })
    .click();
  await expect(card).toBeHidden();
  await settle(page);
  expect((await documentOf(page)).stages[0]!.sides["head"]).toBe("insulated");
});

test("lying and standing, zoom by the wheel, fit", async ({ page }) => {
  await page.getByRole("button", { name: "Lie down" }).click();
  await expect(page.getByRole("group", { name: /upper half editable/ })).toBeVisible();
  const before = await middleOfPoint(page, 3);
  await page.mouse.move(before.x - 60, before.y + 40);
  await page.mouse.wheel(0, -400);
  await expect.poll(async () => Math.abs((await middleOfPoint(page, 3)).x - before.x)).toBeGreaterThan(10);
  await page.getByRole("button", { name: "Fit to the sheet" }).click();
  await expect.poll(async () => Math.abs((await middleOfPoint(page, 3)).x - before.x)).toBeLessThan(1);
});

test("the browser takes the drawing context back: the plain canvas goes on, and the page says so", async ({
  page,
}) => {
  await expect
    .poll(() =>
      page
        .locator("corelag-section")
        .evaluate(
          (e) =>
            e.shadowRoot!.querySelector<HTMLCanvasElement>("canvas.field")!.getContext("webgl2") !== null,
        ),
    )
    .toBe(true);
  await page.locator("corelag-section").evaluate((section) => {
    const canvas = section.shadowRoot!.querySelector<HTMLCanvasElement>("canvas.field")!;
    canvas.getContext("webgl2")!.getExtension("WEBGL_lose_context")!.loseContext();
  });
  await expect(page.getByText("Drawn without 3-D graphics: the browser took them back.")).toBeVisible();
  const { expected, painted } = await fieldColour(page, 0.01, 0.04);
  for (let k = 0; k < 3; k++) expect(Math.abs(painted[k]! - expected[k]!)).toBeLessThanOrEqual(4);
});
