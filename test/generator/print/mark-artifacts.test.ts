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

const nothing = () => null
const header = '/Artifact <</Type /Pagination /Subtype /Header >>BDC'

describe('withArtifacts', () => {
  test('text outside tagged content is marked as running head or foot, text inside is left', () => {
    const tagged = '/P <</MCID 0 >>BDC\nBT\n<01> Tj\nET\nEMC\n'
    const text = (down: number) => `BT\n/F4 11 Tf\n1 0 0 -1 20 ${down} Tm\n<02> Tj\nET`
    expect(withArtifacts(`${text(40)}\n${tagged}`, 842, nothing)).toBe(`${header}\n${text(40)}\nEMC\n${tagged}`)
    expect(withArtifacts(text(1090), 842, nothing)).toBe(`${header.replace('Header', 'Footer')}\n${text(1090)}\nEMC`)
  })

  test('painted paths are marked; a clipping path, which paints nothing, and states are left', () => {
    expect(withArtifacts('q\n0 0 9 9 re\nW* n\n1 1 2 2 re\nf\nQ', 842, nothing)).toBe('q\n0 0 9 9 re\nW* n\n/Artifact BMC\n1 1 2 2 re\nf\nEMC\nQ')
  })

  test('a text object that holds tagged content is not marked as a whole', () => {
    const source = 'BT\n/P <</MCID 0 >>BDC\n<01> Tj\nEMC\nET'
    expect(withArtifacts(source, 842, nothing)).toBe(source)
  })

  test('one that holds a ligature with its letters is', () => {
    const source = 'BT\n1 0 0 -1 20 40 Tm\n/Span<</ActualText (fi) >> BDC\n<01> Tj\nEMC\n<02> Tj\nET'
    expect(withArtifacts(source, 842, nothing)).toBe(`${header}\n${source}\nEMC`)
  })

  test('tagged content that is released is marked as what it is said to be, and told what it paints', () => {
    const asked: unknown[] = []
    const source = '/Table <</MCID 0 >>BDC\n0 0 9 1 re\nf\nEMC\n/P <</MCID 1 >>BDC\nBT\n<01> Tj\nET\nEMC'
    const marked = withArtifacts(source, 842, (content, painted) => { asked.push([content, painted]); return painted.text ? null : '/Artifact BMC' })
    expect(marked).toBe(source.replace('/Table <</MCID 0 >>BDC', '/Artifact BMC'))
    expect(asked).toEqual([[0, { text: false, image: false }], [1, { text: true, image: false }]])
  })
})
