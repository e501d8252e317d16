import { describe, expect, it } from 'vitest'
import { readSettings } from './env'

describe('settings', () => {
  it('can all be absent: the build runs with none set', () => {
    const settings = readSettings({})
    expect(settings.DATABASE_URL).toBeUndefined()
    expect(settings.LOG_LEVEL).toBe('info')
    expect(settings.TALLYBROOK_LOCAL).toBe(false)
  })

  it('takes an empty line for not set', () => {
    const settings = readSettings({ DATABASE_URL: '', BETTER_AUTH_SECRET: '', LOG_LEVEL: '' })
    expect(settings.DATABASE_URL).toBeUndefined()
    expect(settings.BETTER_AUTH_SECRET).toBeUndefined()
    expect(settings.LOG_LEVEL).toBe('info')
  })

  it('names each setting that is wrong in a plain sentence', () => {
    const wrong = {
      DATABASE_URL: 'mysql://x',
      BETTER_AUTH_SECRET: 'short',
      BETTER_AUTH_URL: 'nowhere',
      LOG_LEVEL: 'loud',
    }
    expect(() => readSettings(wrong)).toThrow(
      /DATABASE_URL must look.*BETTER_AUTH_SECRET is too short.*BETTER_AUTH_URL must be.*LOG_LEVEL must be one of/,
    )
  })

  it('never repeats the secret it refuses', () => {
    expect(() => readSettings({ BETTER_AUTH_SECRET: 'hush-hush' })).not.toThrow(/hush-hush/)
  })

  it('turns a flag on by 1 or true only', () => {
    expect(readSettings({ TALLYBROOK_TEST: '1' }).TALLYBROOK_TEST).toBe(true)
    expect(readSettings({ TALLYBROOK_TEST: 'true' }).TALLYBROOK_TEST).toBe(true)
    expect(readSettings({ TALLYBROOK_TEST: '0' }).TALLYBROOK_TEST).toBe(false)
  })
})
