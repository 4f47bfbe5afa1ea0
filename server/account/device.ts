import { text } from '../../shared/text.js';

const BROWSERS: [RegExp, string][] = [
  [/Edg(e|A|iOS)?\//, 'Edge'],
  [/OPR\//, 'Opera'],
  [/(Firefox|FxiOS)\//, 'Firefox'],
  [/(Chrome|CriOS|Chromium)\//, 'Chromium'],
  [/Safari\//, 'Safari'],
];
const SYSTEMS: [RegExp, string][] = [
  [/iPhone|iPad|iPod/, 'iOS'],
  [/Android/, 'Android'],
  [/Windows/, 'Windows'],
  [/Mac OS X|Macintosh/, 'macOS'],
  [/CrOS/, 'ChromeOS'],
  [/Linux|X11/, 'Linux'],
];

/** The device in words, from the browser's user agent: so that a person recognises it in a list. */
export function deviceOf(userAgent: string | undefined): string {
  const find = (list: [RegExp, string][]) => list.find(([pattern]) => pattern.test(userAgent ?? ''))?.[1];
  const browser = find(BROWSERS);
  const system = find(SYSTEMS);
  return browser && system ? text.server.device(browser, system) : (browser ?? system ?? text.server.unknownDevice);
}
