import { createCanvas } from '@napi-rs/canvas'
import jsQR from 'jsqr'
import { getDocument, VerbosityLevel, type PDFDocumentProxy } from 'pdfjs-dist/legacy/build/pdf.mjs'

/** What a PDF holds, read back by another library than the one that wrote it. */
export interface ReadPdf {
  pages: number
  /** Points. */
  width: number
  height: number
  text: string
  title: string
}

const open = (bytes: Uint8Array): Promise<PDFDocumentProxy> =>
  getDocument({ data: new Uint8Array(bytes), verbosity: VerbosityLevel.ERRORS, disableFontFace: true, useSystemFonts: false }).promise

export async function readPdf(bytes: Uint8Array): Promise<ReadPdf> {
  const document = await open(bytes)
  const texts: string[] = []
  for (let number = 1; number <= document.numPages; number++) {
    const content = await (await document.getPage(number)).getTextContent()
    texts.push(content.items.map(item => ('str' in item ? item.str + (item.hasEOL ? '\n' : '') : '')).join(''))
  }
  const { width, height } = (await document.getPage(1)).getViewport({ scale: 1 })
  const { info } = await document.getMetadata()
  return { pages: document.numPages, width, height, text: texts.join('\n'), title: (info as { Title?: string }).Title ?? '' }
}

/** Draws the first page and reads the QR code off the picture, in grey. @returns its text, or null where none is seen. */
export async function readCode(bytes: Uint8Array): Promise<string | null> {
  const page = await (await open(bytes)).getPage(1)
  const viewport = page.getViewport({ scale: 3 })
  const canvas = createCanvas(Math.ceil(viewport.width), Math.ceil(viewport.height))
  await page.render({ canvas: canvas as never, viewport }).promise
  const { data, width, height } = canvas.getContext('2d').getImageData(0, 0, canvas.width, canvas.height)
  return jsQR(new Uint8ClampedArray(data.buffer), width, height)?.data ?? null
}
