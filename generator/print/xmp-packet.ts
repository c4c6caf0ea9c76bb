/** What the file says of itself in XMP; the same as in its information dictionary. */
export interface XmpFacts {
  readonly title: string
  readonly author: string
  /** BCP 47. */
  readonly language: string
  /** ISO 8601 with time and zone, e.g. `2026-10-31T00:00:00Z`: made and changed at once. */
  readonly date: string
  /** The program that the review comes from. */
  readonly creator: string
  /** The program that wrote the PDF. */
  readonly producer: string
}

/**
 * The metadata of a PDF/A-3b (XMP, ISO 16684-1): one packet, UTF-8. PDF/UA-1 is not declared: the file is tagged for it, and not all it asks for
 * is met or checked.
 */
export function xmpPacket({ title, author, language, date, creator, producer }: XmpFacts): string {
  return `<?xpacket begin="\uFEFF" id="W5M0MpCehiHzreSzNTczkc9d"?>
<x:xmpmeta xmlns:x="adobe:ns:meta/">
<rdf:RDF xmlns:rdf="http://www.w3.org/1999/02/22-rdf-syntax-ns#">
<rdf:Description rdf:about="" xmlns:dc="http://purl.org/dc/elements/1.1/">
<dc:format>application/pdf</dc:format>
<dc:title><rdf:Alt><rdf:li xml:lang="x-default">${xmlText(title)}</rdf:li></rdf:Alt></dc:title>
<dc:creator><rdf:Seq><rdf:li>${xmlText(author)}</rdf:li></rdf:Seq></dc:creator>
<dc:language><rdf:Bag><rdf:li>${xmlText(language)}</rdf:li></rdf:Bag></dc:language>
</rdf:Description>
<rdf:Description rdf:about="" xmlns:xmp="http://ns.adobe.com/xap/1.0/">
<xmp:CreatorTool>${xmlText(creator)}</xmp:CreatorTool>
<xmp:CreateDate>${date}</xmp:CreateDate>
<xmp:ModifyDate>${date}</xmp:ModifyDate>
<xmp:MetadataDate>${date}</xmp:MetadataDate>
</rdf:Description>
<rdf:Description rdf:about="" xmlns:pdf="http://ns.adobe.com/pdf/1.3/">
<pdf:Producer>${xmlText(producer)}</pdf:Producer>
</rdf:Description>
<rdf:Description rdf:about="" xmlns:pdfaid="http://www.aiim.org/pdfa/ns/id/">
<pdfaid:part>3</pdfaid:part>
<pdfaid:conformance>B</pdfaid:conformance>
</rdf:Description>
</rdf:RDF>
</x:xmpmeta>
<?xpacket end="r"?>`
}

const escapes: Readonly<Record<string, string>> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;' }

function xmlText(text: string): string {
  return text.replace(/[&<>"]/g, (character) => escapes[character])
}

/**
 * Text that XML can hold: control characters and halves of surrogate pairs, which it can't, give way to U+FFFD, and white space to spaces.
 * Applied before a text goes into the file's information dictionary and its XMP, so that both stay equal.
 */
export function plainText(text: string): string {
  // eslint-disable-next-line no-control-regex -- control characters are what is looked for
  return text.replace(/[\t\n\r]+/g, ' ').replace(/[\p{Surrogate}\u0000-\u001f\ufffe\uffff]/gu, '\uFFFD')
}
