import { existsSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { z } from 'zod';
import type { Browser } from './browser';

/** What a page makes a browser load of scripts, bytes as they travel: gzip, but for files of less than a kilobyte. */
export interface ClientScripts {
  readonly files: number;
  readonly bytes: number;
  /** Fetched when their part of the page is drawn: the chart. */
  readonly laterBytes: number;
}

/** The value of an attribute of a tag. */
function attribute(tag: string, name: string): string | null {
  return new RegExp(`\\s${name}="([^"]*)"`).exec(tag)?.[1] ?? null;
}

/**
 * Addresses of the scripts that a page's HTML loads: script elements, and preloads of scripts and modules. Those marked
 * for browsers without modules are left out: no browser that runs this application loads them.
 */
export function scriptAddresses(html: string): string[] {
  const found = new Set<string>();
  for (const [tag] of html.matchAll(/<script\b[^>]*>/g)) {
    const address = attribute(tag, 'src');
    if (address !== null && !/\snomodule\b/i.test(tag)) found.add(address);
  }
  for (const [tag] of html.matchAll(/<link\b[^>]*>/g)) {
    const rel = attribute(tag, 'rel');
    const isScript = rel === 'modulepreload' || (rel === 'preload' && attribute(tag, 'as') === 'script');
    const address = isScript ? attribute(tag, 'href') : null;
    if (address !== null) found.add(address);
  }
  return [...found];
}

const laterManifest = z.record(z.string(), z.object({ files: z.array(z.string()) }));

/** Scripts that the build lists as loaded later for a page, by `next/dynamic`. */
function laterAddresses(root: string, route: string): string[] {
  const file = path.join(root, '.next/server/app', route, 'page/react-loadable-manifest.json');
  if (!existsSync(file)) throw new Error(`The build holds no page ${route}.`);
  const manifest = laterManifest.parse(JSON.parse(readFileSync(file, 'utf8')));
  return Object.values(manifest).flatMap(({ files }) => files.map((each) => `/_next/${each}`));
}

/** Weighs scripts over HTTP, each once. */
export class ScriptScale {
  readonly #browser: Browser;
  readonly #root: string;
  readonly #known = new Map<string, number>();

  constructor(browser: Browser, root: string) {
    this.#browser = browser;
    this.#root = root;
  }

  async #bytes(address: string): Promise<number> {
    const known = this.#known.get(address);
    if (known !== undefined) return known;
    const { status, body } = await this.#browser.request(address);
    if (status !== 200) throw new Error(`${address} answers ${status}.`);
    this.#known.set(address, body.length);
    return body.length;
  }

  async #sum(addresses: readonly string[]): Promise<number> {
    let bytes = 0;
    for (const address of addresses) bytes += await this.#bytes(address);
    return bytes;
  }

  /**
   * @param html the page's HTML
   * @param route its folder below app/
   */
  async weigh(html: string, route: string): Promise<ClientScripts> {
    const addresses = scriptAddresses(html);
    const later = laterAddresses(this.#root, route).filter((address) => !addresses.includes(address));
    return {
      files: addresses.length,
      bytes: await this.#sum(addresses),
      laterBytes: await this.#sum([...new Set(later)]),
    };
  }
}
