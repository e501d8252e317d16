const browsers: [sign: RegExp, name: string][] = [
  [/\bEdg(e|A|iOS)?\//, 'Edge'],
  [/\bOPR\/|\bOpera\b/, 'Opera'],
  [/\bSamsungBrowser\//, 'Samsung Internet'],
  [/\bFirefox\/|\bFxiOS\//, 'Firefox'],
  [/\bHeadlessChrome\/|\bChrome\/|\bCriOS\//, 'Chrome'],
  [/\bSafari\//, 'Safari'],
]
const systems: [sign: RegExp, name: string][] = [
  [/\biPhone\b/, 'an iPhone'],
  [/\biPad\b/, 'an iPad'],
  [/\bAndroid\b/, 'Android'],
  [/\bWindows\b/, 'Windows'],
  [/\bMac OS X\b|\bMacintosh\b/, 'a Mac'],
  [/\bCrOS\b/, 'a Chromebook'],
  [/\bLinux\b/, 'Linux'],
]

/** "Firefox on Windows", from what a browser says of itself; enough to know one's own again. */
export function browserWords(userAgent: string | null): string {
  const nameIn = (list: [RegExp, string][]) => list.find(([sign]) => sign.test(userAgent ?? ''))?.[1]
  const browser = nameIn(browsers)
  const system = nameIn(systems)
  if (browser && system) return `${browser} on ${system}`
  return browser ?? (system ? `A browser on ${system}` : 'A program that does not say what it is')
}
