import {mkdtempSync, rmSync} from 'node:fs';
import {createServer} from 'node:http';
import {type AddressInfo} from 'node:net';
import {tmpdir} from 'node:os';
import path from 'node:path';
import {chromium} from '@playwright/test';
import {build} from 'esbuild';
import puppeteer from 'puppeteer-core';
import {type Probe} from './probe';

const ROOT = path.resolve(import.meta.dirname, '../../..');

/** A browser with the engine in a page. */
export interface Browser {
  /** Name and version. */
  readonly name: string;
  /** Lives sessions, given and answered as JSON, in the page or in a worker of it. */
  readonly live: (place: keyof Probe, json: string) => Promise<string>;
  readonly close: () => Promise<void>;
}

/** A loopback server with a blank page and the engine in one script. */
export interface ProbeServer {
  readonly url: string;
  readonly close: () => Promise<void>;
}

export async function serveProbe(): Promise<ProbeServer> {
  const {outputFiles} = await build({
    absWorkingDir: ROOT,
    entryPoints: ['test/repeat/support/probe.ts'],
    bundle: true,
    write: false,
    format: 'iife',
    target: 'es2022',
    minify: true, // as the product is
    tsconfig: 'tsconfig.json',
    logLevel: 'silent', // the error thrown says it all
  });
  const script = outputFiles[0]!.text;
  const page = '<!doctype html><title>probe</title><script src="/probe.js"></script>';
  const server = createServer(({url}, reply) => {
    const isScript = url === '/probe.js';
    reply.setHeader('Content-Type', isScript ? 'text/javascript' : 'text/html; charset=utf-8');
    reply.end(isScript ? script : page);
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  const {port} = server.address() as AddressInfo;
  return {
    url: `http://127.0.0.1:${port}/`,
    close: () =>
      new Promise((resolve) => {
        server.closeAllConnections();
        server.close(() => resolve());
      }),
  };
}

/** Debian's Chromium: as root it needs no-sandbox; it must find no other host and not call home. */
const CHROMIUM_FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-dev-shm-usage',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--disable-quic',
  '--no-first-run',
  '--disable-extensions',
  '--host-resolver-rules=MAP * ~NOTFOUND, EXCLUDE 127.0.0.1',
];

export async function openChromium(url: string): Promise<Browser> {
  const browser = await chromium.launch({
    executablePath: '/usr/bin/chromium',
    headless: true,
    args: CHROMIUM_FLAGS,
  });
  const page = await browser.newPage();
  await page.goto(url);
  return {
    name: `Chromium ${browser.version()}`,
    live: (place, json) => page.evaluate(callProbe, [place, json] as const),
    close: () => browser.close(),
  };
}

/** Whatever is not on loopback goes to a proxy that is not there, and no name is looked up. */
const FIREFOX_PREFERENCES = {
  'network.proxy.type': 1,
  'network.proxy.http': '127.0.0.1',
  'network.proxy.http_port': 9,
  'network.proxy.ssl': '127.0.0.1',
  'network.proxy.ssl_port': 9,
  'network.proxy.socks_remote_dns': true,
  'network.proxy.no_proxies_on': '127.0.0.1',
  'network.proxy.failover_direct': false,
  'network.dns.disabled': true,
  'network.captive-portal-service.enabled': false,
  'network.connectivity-service.enabled': false,
  'network.dns.disablePrefetch': true,
  'network.http.speculative-parallel-limit': 0,
  'network.prefetch-next': false,
  'network.trr.mode': 5,
  'app.update.enabled': false,
  'app.update.auto': false,
  'app.normandy.enabled': false,
  'browser.safebrowsing.update.enabled': false,
  'browser.search.update': false,
  'browser.region.update.enabled': false,
  'browser.topsites.contile.enabled': false,
  'datareporting.healthreport.uploadEnabled': false,
  'datareporting.policy.dataSubmissionEnabled': false,
  'dom.push.connection.enabled': false,
  'extensions.getAddons.cache.enabled': false,
  'extensions.update.enabled': false,
  'media.gmp-manager.updateEnabled': false,
  'services.settings.server': 'data:,',
  'toolkit.telemetry.enabled': false,
  'toolkit.telemetry.unified': false,
};

/**
 * Debian's Firefox, with a home of its own: it refuses one that belongs to somebody else. A release heeds
 * `services.settings.server` only with the last of these variables. With all this it asked for no other host
 * in 20 s, seen by a proxy that listened.
 */
export async function openFirefox(url: string): Promise<Browser> {
  const home = mkdtempSync(path.join(tmpdir(), 'evenspan-firefox-'));
  const browser = await puppeteer.launch({
    browser: 'firefox',
    executablePath: '/usr/bin/firefox-esr',
    headless: true,
    extraPrefsFirefox: FIREFOX_PREFERENCES,
    env: {
      ...process.env,
      HOME: home,
      MOZ_CRASHREPORTER_DISABLE: '1',
      MOZ_REMOTE_SETTINGS_DEVTOOLS: '1',
    },
  });
  const page = await browser.newPage();
  await page.goto(url);
  return {
    name: await browser.version(),
    live: (place, json) => page.evaluate(callProbe, [place, json] as const),
    close: async () => {
      await browser.close();
      rmSync(home, {recursive: true, force: true});
    },
  };
}

/** Runs in the page. */
function callProbe([place, json]: readonly [keyof Probe, string]): string | Promise<string> {
  return (globalThis as unknown as {readonly probe: Probe}).probe[place](json);
}
