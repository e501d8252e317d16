import { expect, it } from 'vitest'
import { linksIn } from './stand-in'

it('finds the links of a text', () => {
  expect(linksIn('Choose:\nhttp://127.0.0.1:1/a?b=c\n\n-- \nT, https://x.example')).toEqual([
    'http://127.0.0.1:1/a?b=c',
    'https://x.example',
  ])
})
