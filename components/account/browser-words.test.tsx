import { describe, expect, it } from 'vitest'
import { browserWords } from './browser-words'

describe('browserWords', () => {
  it.each([
    ['Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0', 'Firefox on Linux'],
    [
      'Mozilla/5.0 (Windows NT 10.0; Win64; x64) AppleWebKit/537.36 Chrome/140.0 Safari/537.36 Edg/140.0',
      'Edge on Windows',
    ],
    [
      'Mozilla/5.0 (Linux; Android 15; Pixel) AppleWebKit/537.36 Chrome/140.0 Mobile Safari/537.36',
      'Chrome on Android',
    ],
    [
      'Mozilla/5.0 (iPhone; CPU iPhone OS 18_0 like Mac OS X) AppleWebKit/605 Version/18.0 Safari/604.1',
      'Safari on an iPhone',
    ],
    ['Mozilla/5.0 (Macintosh; Intel Mac OS X 10_15_7) AppleWebKit/605 Version/18.0 Safari/605.1', 'Safari on a Mac'],
    ['curl/8.0', 'A program that does not say what it is'],
    ['', 'A program that does not say what it is'],
    [null, 'A program that does not say what it is'],
  ])('%s', (userAgent, words) => {
    expect(browserWords(userAgent)).toBe(words)
  })
})
