import { mkdirSync } from "node:fs";
import { chromium, type Browser, type BrowserContext, type Page } from "playwright-core";

/** The two sizes every story is walked at. */
export const SIZES = {
  wide: { width: 1440, height: 900 },
  phone: { width: 390, height: 844 },
} as const;
export type SizeName = keyof typeof SIZES;

export function openBrowser(): Promise<Browser> {
  return chromium.launch({
    executablePath: process.env.CHROMIUM_PATH ?? "/usr/bin/chromium",
    args: [
      "--no-sandbox",
      "--use-angle=swiftshader",
      "--enable-unsafe-swiftshader",
      "--disable-background-networking",
      "--disable-dev-shm-usage",
    ],
  });
}

export interface Visit {
  context: BrowserContext;
  page: Page;
  /** What the page complained of: script errors, refused scripts and styles, server errors. */
  complaints: string[];
  /** Keeps a picture under `.data/screenshots/`, and says by how many pixels the page can be moved sideways. */
  picture: (label: string, options?: { fullPage?: boolean }) => Promise<number>;
}

/** A fresh person at one size. */
export async function beginVisit(browser: Browser, size: SizeName): Promise<Visit> {
  const isPhone = size === "phone";
  const context = await browser.newContext({ viewport: SIZES[size], isMobile: isPhone, hasTouch: isPhone });
  context.setDefaultTimeout(60_000);
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on("pageerror", (error) => complaints.push(error.message));
  page.on("console", (message) => {
    if (message.type() === "error" && !message.text().startsWith("Failed to load resource"))
      complaints.push(message.text());
  });
  page.on("response", (response) => {
    if (response.status() >= 500) complaints.push(`${response.status()} ${response.url()}`);
  });
  const folder = `${process.env.SCREENSHOT_DIR ?? ".data/screenshots"}`;
  mkdirSync(folder, { recursive: true });
  const picture = async (label: string, options: { fullPage?: boolean } = {}) => {
    await page.screenshot({ path: `${folder}/${label}-${size}.png`, fullPage: options.fullPage ?? false });
    return page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
  };
  return { context, page, complaints, picture };
}

/** Signs in through the page, as a person does. */
export async function signInAs(
  page: Page,
  baseUrl: string,
  account: { email: string; password: string },
): Promise<void> {
  await page.goto(`${baseUrl}/sign-in`);
  await page.getByLabel("Email").fill(account.email);
  await page.getByLabel("Password", { exact: true }).fill(account.password);
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await page.waitForURL(/\/fields$/);
}
