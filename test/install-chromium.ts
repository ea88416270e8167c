import { execFileSync } from "node:child_process";
import { existsSync } from "node:fs";

/** Where Debian puts the browser. */
export const CHROMIUM = "/usr/bin/chromium";

const MINUTES = 60_000;

/**
 * Makes the browser present where that is possible: already there, or installed by the system's package manager when run as root.
 * Returns null when it is there, else the reason why it is not.
 */
export function chromiumMissing(): string | null {
  if (existsSync(CHROMIUM)) return null;
  if (process.platform !== "linux") return `no ${CHROMIUM}, and no apt-get on ${process.platform}`;
  if (process.getuid?.() !== 0)
    return `no ${CHROMIUM}, and only root may install it: apt-get install chromium`;
  try {
    run(["update"], 5 * MINUTES);
    run(["install", "-y", "--no-install-recommends", "chromium"], 15 * MINUTES);
  } catch (error) {
    return `chromium could not be installed: ${error instanceof Error ? error.message.split("\n")[0] : String(error)}`;
  }
  return existsSync(CHROMIUM) ? null : `apt-get installed chromium but left no ${CHROMIUM}`;
}

function run(parts: readonly string[], timeout: number): void {
  execFileSync("apt-get", ["-q", ...parts], {
    stdio: ["ignore", "ignore", "pipe"],
    timeout,
    env: { ...process.env, DEBIAN_FRONTEND: "noninteractive" },
  });
}

/** Flags for a browser without a window that asks the network for nothing of its own. */
export const CHROMIUM_FLAGS: readonly string[] = [
  "--headless",
  "--no-sandbox",
  "--disable-gpu",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
];
