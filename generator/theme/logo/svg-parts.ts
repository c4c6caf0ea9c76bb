/** What a logo's SVG may hold (SVG 2): shapes, groups, gradients, clip paths. No text, picture, copy, style sheet, animation, filter, link or foreign part. */
export const allowedElements: ReadonlySet<string> = new Set([
  'svg', 'g', 'defs', 'path', 'rect', 'circle', 'ellipse', 'line', 'polyline', 'polygon', 'linearGradient', 'radialGradient', 'stop', 'clipPath',
])

/** What is said of a drawing and not drawn. */
export const leftOut: ReadonlySet<string> = new Set(['title', 'desc', 'metadata'])

/** Properties of a shape, as attributes or in its `style`. */
export const presentation: ReadonlySet<string> = new Set([
  'fill', 'fill-opacity', 'fill-rule', 'clip-rule', 'clip-path', 'stroke', 'stroke-width', 'stroke-opacity', 'stroke-linecap', 'stroke-linejoin', 'stroke-miterlimit',
  'stroke-dasharray', 'stroke-dashoffset', 'opacity', 'color', 'stop-color', 'stop-opacity', 'display', 'visibility', 'paint-order',
])

export const allowedAttributes: ReadonlySet<string> = new Set([
  ...presentation,
  'id', 'transform', 'd', 'points', 'x', 'y', 'width', 'height', 'rx', 'ry', 'cx', 'cy', 'r', 'x1', 'y1', 'x2', 'y2', 'fx', 'fy', 'fr',
  'offset', 'gradientUnits', 'gradientTransform', 'spreadMethod', 'clipPathUnits', 'preserveAspectRatio',
])
