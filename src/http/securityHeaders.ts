import { env } from '@/config/env';

/** Features of the browser no page of ours uses. */
const PERMISSIONS =
  'accelerometer=(), camera=(), display-capture=(), geolocation=(), gyroscope=(), magnetometer=(), microphone=(), ' +
  'midi=(), payment=(), usb=()';

type HeaderList = [name: string, value: string][];

function everywhere(): HeaderList {
  const list: HeaderList = [
    ['x-content-type-options', 'nosniff'],
    ['referrer-policy', 'same-origin'],
    ['cross-origin-resource-policy', 'same-origin'],
  ];
  if (env().APP_ORIGIN.startsWith('https:')) list.push(['strict-transport-security', 'max-age=31536000']);
  return list;
}

/** A new nonce for one page: 16 random bytes in base64. */
export function newNonce(): string {
  return btoa(String.fromCharCode(...crypto.getRandomValues(new Uint8Array(16))));
}

/**
 * What a page may load: scripts and styles of this origin that carry the nonce (or come from such a script), and
 * nothing from anywhere else. `development` lets React evaluate code for its error overlay.
 */
export function contentSecurityPolicy(nonce: string, development = false): string {
  return [
    `default-src 'none'`,
    `script-src 'self' 'nonce-${nonce}' 'strict-dynamic'${development ? ` 'unsafe-eval'` : ''}`,
    `style-src 'self' 'nonce-${nonce}'`,
    `img-src 'self' data: blob:`,
    `font-src 'self'`,
    `connect-src 'self'`,
    `manifest-src 'self'`,
    `worker-src 'self'`,
    `object-src 'none'`,
    `base-uri 'none'`,
    `form-action 'self'`,
    `frame-ancestors 'none'`,
  ].join('; ');
}

/** The headers of a page. */
export function pageHeaders(policy: string): HeaderList {
  return [
    ...everywhere(),
    ['content-security-policy', policy],
    ['cross-origin-opener-policy', 'same-origin'],
    ['permissions-policy', PERMISSIONS],
    ['x-frame-options', 'DENY'],
    ['cache-control', 'no-store'],
  ];
}

/** The headers of an API reply; one that the reply has set itself stands. */
export function apiHeaders(): HeaderList {
  return [
    ...everywhere(),
    ['content-security-policy', `default-src 'none'; frame-ancestors 'none'; sandbox`],
    ['cache-control', 'no-store'],
  ];
}

/** Adds `apiHeaders` to a reply. */
export function withApiHeaders(response: Response): Response {
  for (const [name, value] of apiHeaders()) if (!response.headers.has(name)) response.headers.set(name, value);
  return response;
}

/**
 * The headers of bytes somebody uploaded: saved under their name, never shown, and without any right if they are.
 * The name goes out twice (RFC 6266): in ASCII, and in UTF-8 as RFC 8187 (formerly 5987) writes it.
 */
export function fileHeaders(name: string, contentType = 'application/octet-stream'): HeaderList {
  // Control characters, what a file system takes for a path, and lone surrogates, which have no UTF-8.
  const plain = [...name.replace(/[\p{Cc}\p{Cs}/\\]/gu, '_')].slice(0, 200).join('') || 'file';
  const ascii = plain.replace(/[^\x20-\x7e]/g, '_').replace(/["%]/g, '_');
  const utf8 = encodeURIComponent(plain).replace(/['()*]/g, (c) => `%${c.charCodeAt(0).toString(16).toUpperCase()}`);
  return [
    ['content-type', contentType],
    ['content-disposition', `attachment; filename="${ascii}"; filename*=UTF-8''${utf8}`],
    ['content-security-policy', `default-src 'none'; sandbox`],
    ['x-content-type-options', 'nosniff'],
  ];
}

/** The reply to signing out makes the browser drop what it keeps of this origin besides cookies. */
export const CLEAR_SITE_DATA = '"cache", "storage"';

/**
 * The headers of a picture that this server encoded itself: shown in a page, kept by nobody on the way, and asked for
 * again each time, since it may have been withdrawn or its reader signed out.
 */
export function pictureHeaders(contentType: string, etag: string): HeaderList {
  return [
    ['content-type', contentType],
    ['content-disposition', 'inline'],
    ['cache-control', 'private, no-cache'],
    ['etag', etag],
    ['content-security-policy', `default-src 'none'; sandbox`],
    ['x-content-type-options', 'nosniff'],
  ];
}
