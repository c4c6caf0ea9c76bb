/** A page of everything that a review has, without its house: heads, lists, links, a see-through picture, a table over two pages, a mean name. */
export const smallReview = `<!doctype html><html lang="en-GB"><head><title>Small</title><style>
  @page { size: A4; margin: 20mm; @top-left { content: "The office head" } @bottom-right { content: "Page " counter(page) } }
  h2, th, td { border-bottom: 1px solid #345 } thead { display: table-header-group } td, th { padding: 6px }
</style></head><body><main>
<h1>Small &amp; whole</h1>
<p>A <strong>strong</strong> and an <em>emphatic</em> word, <a href="#figures">the figures</a>, page <span data-page-of="figures"></span>, <a href="https://example.org/method">the method</a>, <a href="#größe">the size</a>, page <span data-page-of="größe"></span>.</p>
<ul><li>one</li><li><strong>two</strong> and more</li></ul><ol><li>first</li></ol>
<figure role="group"><figcaption>What it shows</figcaption><svg role="img" aria-label="A square" width="90" height="90"><rect width="60" height="60" fill="#066" fill-opacity="0.4"/></svg></figure>
<h2 id="figures">Figures</h2>
<table><caption>Rows</caption><thead><tr><th scope="col">Name</th><th scope="col">Value</th></tr></thead><tbody>
${Array.from({ length: 60 }, (_, row) => `<tr><th scope="row">row ${row}</th><td>${row * row}</td></tr>`).join('\n')}
</tbody></table><h2 id="größe">Größe</h2><p>And how large.</p></main></body></html>`

export const smallFacts = { title: 'Small <and> "whole" & sound', author: 'An analyst', date: '2026-10-31', language: 'en-GB' }

const bytes = (text: string) => new TextEncoder().encode(text)

/** Out of order, as a caller may have them. */
export const smallFiles = [
  { name: 'rows.csv', mime: 'text/csv', description: 'Rows – all', relationship: 'Data', bytes: bytes('name,value\r\na,1\r\n') },
  { name: 'findings.json', mime: 'application/json', description: 'Findings', relationship: 'Data', bytes: bytes(JSON.stringify({ figure: 'é'.repeat(5000) })) },
] as const
