import { describe, expect, test } from 'vitest'
import { MachineFault } from '../../../generator/faults/fault.ts'
import { findBrowser, type Machine } from '../../../generator/print/find-browser.ts'
import { openBrowser } from '../../../generator/print/open-browser.ts'

const packaged = { executable: '/cache/chromium', libraries: '/cache/lib', fontConfiguration: '/cache/fonts.conf' }
const machine = (programs: readonly string[], other: Partial<Machine> = {}): Machine => ({
  platform: 'linux', architecture: 'x64', asked: undefined, pinned: '/pinned/chrome', isProgram: (path) => programs.includes(path), unpack: async () => packaged, ...other,
})
const nothingToUnpack = { unpack: async () => { throw new Error('no space left') } }

async function faultOf(attempt: Promise<unknown>): Promise<MachineFault> {
  const fault = await attempt.then(() => undefined, (thrown: unknown) => thrown)
  if (!(fault instanceof MachineFault)) throw new Error(`expected a MachineFault, got ${String(fault)}`)
  return fault
}

describe('the order', () => {
  test('the one asked for comes first', async () => {
    expect(await findBrowser(machine(['/mine', '/pinned/chrome'], { asked: '/mine' }))).toEqual({ executable: '/mine' })
  })
  test('then the pinned one', async () => {
    expect(await findBrowser(machine(['/pinned/chrome', '/usr/bin/chromium']))).toEqual({ executable: '/pinned/chrome' })
  })
  test('then the packaged one', async () => {
    expect(await findBrowser(machine(['/usr/bin/chromium']))).toEqual(packaged)
  })
  test('then an installed one', async () => {
    expect(await findBrowser(machine(['/usr/bin/chromium'], nothingToUnpack))).toEqual({ executable: '/usr/bin/chromium' })
  })
  test('the packaged one is for Linux on x64 only', async () => {
    expect(await findBrowser(machine(['/usr/bin/chromium'], { architecture: 'arm64' }))).toEqual({ executable: '/usr/bin/chromium' })
  })
})

describe('the machine lacks a browser: exit code 3', () => {
  test('everything tried is named, and the mend', async () => {
    const { fault } = await faultOf(findBrowser(machine([], nothingToUnpack)))
    expect(fault.code).toBe('browser-missing')
    for (const tried of ['/pinned/chrome', 'no space left', '/usr/bin/chromium', '/usr/bin/microsoft-edge']) expect(fault.message).toContain(tried)
    expect(fault.mend).toContain('--browser')
  })

  test('a browser asked for that is not there is a fault, whatever else is there', async () => {
    const { fault } = await faultOf(findBrowser(machine(['/usr/bin/chromium'], { asked: '/nowhere' })))
    expect(fault.message).toContain('/nowhere')
    expect(fault.message).not.toContain('/usr/bin/chromium')
  })

  test('a program that is no browser does not start', async () => {
    const { fault } = await faultOf(openBrowser({ browser: '/bin/false' }))
    expect(fault.code).toBe('browser-does-not-start')
    expect(fault.place).toBe('/bin/false')
  })
})
