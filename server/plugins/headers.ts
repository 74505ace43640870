import { randomBytes } from 'node:crypto'

/**
 * What a page of ours may load: itself only. Scripts by nonce, since the renderer writes one inline;
 * style attributes are allowed because strips and charts place their marks with them.
 */
function contentSecurityPolicy(nonce: string): string {
  return [
    'default-src \'none\'',
    `script-src 'self' 'nonce-${nonce}'`,
    // While developing, Vite writes the styles into the page by script; a nonce would make the allowance void.
    import.meta.dev ? 'style-src \'self\' \'unsafe-inline\'' : `style-src 'self' 'nonce-${nonce}'`,
    'style-src-attr \'unsafe-inline\'',
    'img-src \'self\' blob: data:',
    'font-src \'self\'',
    'connect-src \'self\'',
    'manifest-src \'self\'',
    'worker-src \'self\'',
    'frame-ancestors \'none\'',
    'base-uri \'none\'',
    'form-action \'self\'',
  ].join('; ')
}

const withNonce = (html: string, nonce: string): string => html.replace(/<(script|style)(?=[\s>])/g, `<$1 nonce="${nonce}"`)

export default defineNitroPlugin((nitro) => {
  nitro.hooks.hook('request', (event) => {
    setResponseHeaders(event, {
      'x-content-type-options': 'nosniff',
      'referrer-policy': 'same-origin',
      'x-frame-options': 'DENY',
      'cross-origin-opener-policy': 'same-origin',
      'cross-origin-resource-policy': 'same-origin',
      'permissions-policy': 'camera=(self), geolocation=(), microphone=(), payment=()',
    })
  })
  nitro.hooks.hook('render:html', (html, { event }) => {
    const nonce = randomBytes(16).toString('base64')
    for (const part of ['head', 'bodyPrepend', 'body', 'bodyAppend'] as const) html[part] = html[part].map(text => withNonce(text, nonce))
    setResponseHeaders(event, {
      'content-security-policy': contentSecurityPolicy(nonce),
      // A page carries a nonce and knows its user.
      'cache-control': 'no-store',
    })
  })
})
