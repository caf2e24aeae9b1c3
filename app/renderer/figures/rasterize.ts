/** From SVG to PNG, by the browser. */

const PIXELS_A_POINT = 4
const MOST_PIXELS = 8192

/** On white, four pixels a point. Rejects where the browser can't draw it. */
export async function svgToPng(svg: string): Promise<Uint8Array> {
  const address = URL.createObjectURL(new Blob([svg], { type: 'image/svg+xml' }))
  try {
    const image = new Image()
    image.src = address
    await image.decode()
    const enlarged = Math.min(PIXELS_A_POINT, MOST_PIXELS / Math.max(image.width, image.height))
    const canvas = document.createElement('canvas')
    canvas.width = Math.round(image.width * enlarged)
    canvas.height = Math.round(image.height * enlarged)
    const context = canvas.getContext('2d')
    if (!context) throw new Error('this browser draws no pictures')
    context.fillStyle = '#ffffff'
    context.fillRect(0, 0, canvas.width, canvas.height)
    context.drawImage(image, 0, 0, canvas.width, canvas.height)
    return await pngOf(canvas)
  } finally {
    URL.revokeObjectURL(address)
  }
}

export async function pngOf(canvas: HTMLCanvasElement): Promise<Uint8Array> {
  const blob = await new Promise<Blob | null>((resolve) => canvas.toBlob(resolve, 'image/png'))
  if (!blob) throw new Error('the picture is too large')
  return new Uint8Array(await blob.arrayBuffer())
}
