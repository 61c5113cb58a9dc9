// Chromium from Debian, driven through playwright-core: no window, no network beyond this machine.
import { type Browser, chromium } from "playwright-core";
import { CHROMIUM } from "./hosts.ts";

const FLAGS = [
  "--headless",
  "--no-sandbox",
  "--disable-gpu",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
];

export function openBrowser(): Promise<Browser> {
  return chromium.launch({ executablePath: CHROMIUM, args: FLAGS });
}
