import { describe, expect, test } from 'vitest'
import { operationsOf } from '../../../generator/print/content-stream.ts'
import { withArtifacts } from '../../../generator/print/mark-artifacts.ts'

describe('operationsOf', () => {
  test('splits operands from operators, strings and dictionaries kept whole', () => {
    const source = '/P <</MCID 0 >>BDC\nBT\n(a (b) \\) BT) Tj\n[<0041> -3 (c)] TJ\nET\nEMC\n0 0 10 10 re\nf*'
    const operations = operationsOf(source)
    expect(operations.map((operation) => operation.operator)).toEqual(['BDC', 'BT', 'Tj', 'TJ', 'ET', 'EMC', 're', 'f*'])
    expect(source.slice(operations[2].start, operations[2].end)).toBe('(a (b) \\) BT) Tj')
    expect(source.slice(operations[6].start, operations[6].end)).toBe('0 0 10 10 re')
  })
})

describe('withArtifacts', () => {
  test('text outside tagged content is marked, text inside is left', () => {
    const tagged = '/P <</MCID 0 >>BDC\nBT\n<01> Tj\nET\nEMC\n'
    expect(withArtifacts(`BT\n<02> Tj\nET\n${tagged}`)).toBe(`/Artifact BMC\nBT\n<02> Tj\nET\nEMC\n${tagged}`)
  })

  test('painted paths are marked; a clipping path, which paints nothing, and states are left', () => {
    expect(withArtifacts('q\n0 0 9 9 re\nW* n\n1 1 2 2 re\nf\nQ')).toBe('q\n0 0 9 9 re\nW* n\n/Artifact BMC\n1 1 2 2 re\nf\nEMC\nQ')
  })

  test('a text object that holds tagged content is not marked as a whole', () => {
    const source = 'BT\n/P <</MCID 0 >>BDC\n<01> Tj\nEMC\nET'
    expect(withArtifacts(source)).toBe(source)
  })
})
