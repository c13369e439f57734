const browsers: readonly (readonly [RegExp, string])[] = [
  [/\bEdg(?:A|iOS)?\//, 'Edge'],
  [/\bOPR\//, 'Opera'],
  [/\bFirefox\/|\bFxiOS\//, 'Firefox'],
  [/\bCriOS\/|\bChrom(?:e|ium)\//, 'Chrome'],
  [/\bSafari\//, 'Safari'],
];

const systems: readonly (readonly [RegExp, string])[] = [
  [/\biPhone\b/, 'iPhone'],
  [/\biPad\b/, 'iPad'],
  [/\bAndroid\b/, 'Android'],
  [/\bWindows\b/, 'Windows'],
  [/\bMac OS X\b|\bMacintosh\b/, 'Mac'],
  [/\bCrOS\b/, 'ChromeOS'],
  [/\bLinux\b/, 'Linux'],
];

const first = (table: readonly (readonly [RegExp, string])[], text: string) =>
  table.find(([pattern]) => pattern.test(text))?.[1];

/** "Firefox on Windows": enough for a person to know which of their devices it is. */
export function deviceOf(userAgent: string): string {
  const browser = first(browsers, userAgent);
  const system = first(systems, userAgent);
  if (browser && system) return `${browser} on ${system}`;
  return browser ?? system ?? 'Another program';
}
