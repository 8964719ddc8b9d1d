/** The page as a whole: head, units, sheets, keys, privacy, and a solver that dies. */
import { expect, test } from "@playwright/test";
import AxeBuilder from "@axe-core/playwright";
import { documentOf, expectAccessible, nameState, openQuick, settle } from "../helpers/quickPage.ts";
import { pointName } from "../helpers/sectionPage.ts";

test.beforeEach(async ({ page }) => nameState(page));

test("the whole page is accessible, at every width the look names", async ({ page }) => {
  await openQuick(page);
  await expectAccessible(page, "corelag-head");
  for (const [width, height] of [
    [1280, 720],
    [1920, 1080],
    [820, 1180],
    [640, 900],
  ] as const) {
    await page.setViewportSize({ width, height });
    const { violations } = await new AxeBuilder({ page }).analyze();
    expect(violations.map(({ id, nodes }) => `${width}: ${id} ${nodes[0]?.target.join(" ")}`)).toEqual([]);
    const overflow = await page.evaluate(
      () => window.document.documentElement.scrollWidth - window.innerWidth,
    );
    expect(overflow).toBeLessThanOrEqual(0);
  }
});

test("other units everywhere at a key, and back", async ({ page }) => {
  await openQuick(page);
  await page.locator("corelag-section svg.lines").click({ position: { x: 80, y: 40 } });
  await page.keyboard.press("u");
  await expect(
    page.getByRole("button", { name: "Point 3, wall to head, r 1.181, z 3.150 in" }),
  ).toBeVisible();
  await expect(page.getByText("in", { exact: true }).or(page.getByText("z in"))).toBeTruthy();
  await page.getByRole("button", { name: "mm °C" }).click();
  await expect(page.getByRole("button", { name: "Point 3, wall to head, r 30.0, z 80.0 mm" })).toBeVisible();
  expect((await documentOf(page)).part.regions[0]!.outline[1]!.at).toEqual(["30 mm", 0]);
});

test("light, dark and the system's sheet", async ({ page }) => {
  await openQuick(page);
  const choose = async (name: string): Promise<void> => {
    await page.getByRole("button", { name: "More", exact: true }).click();
    await page.getByRole("menuitem", { name }).click();
  };
  await choose("Dark sheet");
  await expect(page.locator("html")).toHaveAttribute("data-theme", "dark");
  await choose("As the system");
  await expect(page.locator("html")).toHaveAttribute("data-theme", "light");
  await page.emulateMedia({ colorScheme: "dark" });
  await expect(page.locator("html")).toHaveAttribute("data-theme", "dark");
});

test("keys: the list of keys, undo and redo, answers by digit, arrival by A, never in a field", async ({
  page,
}) => {
  await openQuick(page);
  await page.keyboard.press("Shift+?");
  await expect(page.getByRole("heading", { name: "Keys" })).toBeVisible();
  await expectAccessible(page, "corelag-keys");
  await page.keyboard.press("Escape");
  await pointName(page, 3).focus();
  await page.keyboard.press("ArrowRight");
  await page.keyboard.press("Control+z");
  expect((await documentOf(page)).part.regions[0]!.outline[2]!.at[0]).toBe("30 mm");
  await page.keyboard.press("Control+y");
  expect((await documentOf(page)).part.regions[0]!.outline[2]!.at[0]).toBe("31 mm");
  await settle(page);
  await page.keyboard.press("1");
  await page.keyboard.press("a");
  await expect(page.getByText(/when each point/).first()).toBeVisible();
  const title = page.getByLabel("title of the case");
  await title.fill("Bar 1 u a");
  await expect(page.getByRole("button", { name: "mm °C" })).toHaveAttribute("aria-pressed", "true");
});

test("nothing leaves the origin, and the policy against foreign scripts holds", async ({ page, baseURL }) => {
  const foreign: string[] = [];
  const refused: string[] = [];
  page.on("request", (request) => {
    const url = request.url();
    if (!url.startsWith(baseURL!) && !url.startsWith("data:") && !url.startsWith("blob:")) foreign.push(url);
  });
  page.on(
    "console",
    (message) => /Content Security Policy/.test(message.text()) && refused.push(message.text()),
  );
  await openQuick(page);
  await expect(page.locator("corelag-section canvas.field")).toBeVisible();
  expect(foreign).toEqual([]);
  expect(refused).toEqual([]);
  // in a task of the page itself: what the test driver evaluates is not bound by the policy
  const evaluated = await page.evaluate(
    () =>
      new Promise<string>((resolve) =>
        setTimeout(() => {
          try {
            resolve(String(new Function("return 1")()));
          } catch {
            resolve("refused");
          }
        }, 0),
      ),
  );
  expect(evaluated).toBe("refused");
});

test("a solver that cannot run is told in plain words; nothing is lost, and it can be tried again", async ({
  page,
}) => {
  await openQuick(page);
  await page.route(/solve\.worker/, (route) => route.abort());
  await page.reload();
  await page.waitForFunction(() => window.document.querySelector("corelag-app") !== null);
  await expect(page.getByText("stopped", { exact: true })).toBeVisible();
  expect((await documentOf(page)).title).toBe("Quick bar");
  await expect(pointName(page, 3)).toBeVisible();
  await expectAccessible(page, "corelag-section");
  await page.unroute(/solve\.worker/);
  await page.getByRole("button", { name: "Work it out again" }).click();
  await settle(page);
});
