/** The direction of imports: data flows one way (DEVELOPERS.md), and the lint holds it. */
module.exports = {
  forbidden: [
    { name: 'no-circles', severity: 'error', from: {}, to: { circular: true, viaOnly: { dependencyTypesNot: ['type-only'] } } },
    { name: 'model-is-pure', severity: 'error', from: { path: '^model' }, to: { path: '^(generator|test|sample-data)' } },
    { name: 'model-needs-no-node', severity: 'error', from: { path: '^model' }, to: { dependencyTypes: ['core'] } },
    { name: 'model-imports-only-zod', severity: 'error', from: { path: '^model' }, to: { path: 'node_modules', pathNot: 'node_modules/(zod)/' } },
    { name: 'intake-knows-no-document', severity: 'error', from: { path: '^generator/(account|intake|inputs)' }, to: { path: '^generator/(tables|compose|render|print|review|cli)' } },
    { name: 'document-knows-no-intake', severity: 'error', from: { path: '^generator/(tables|compose|theme|render|print)' }, to: { path: '^generator/(intake|inputs|review|cli)' } },
    { name: 'render-before-print', severity: 'error', from: { path: '^generator/(tables|compose|theme|render)' }, to: { path: '^generator/print' } },
    { name: 'source-knows-no-test', severity: 'error', from: { path: '^(generator|model)' }, to: { path: '^test' } },
  ],
  options: { tsPreCompilationDeps: true, doNotFollow: { path: 'node_modules' }, tsConfig: { fileName: 'tsconfig.json' }, enhancedResolveOptions: { extensions: ['.ts', '.js', '.json'], exportsFields: ['exports'], conditionNames: ['import', 'node', 'default'] } },
}
