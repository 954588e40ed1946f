import helmet from 'helmet';

/** Scripts only from here; WebAssembly may compile; the drawing library sets style attributes. */
export function securityHeaders(publicUrl: string, providerOrigin: string) {
  const secure = publicUrl.startsWith('https:');
  return helmet({
    strictTransportSecurity: secure ? { maxAge: 31_536_000 } : false,
    referrerPolicy: { policy: 'same-origin' },
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        'default-src': ["'none'"],
        'script-src': ["'self'", "'wasm-unsafe-eval'"],
        'style-src': ["'self'", "'unsafe-inline'"],
        'img-src': ["'self'", 'data:', 'blob:'],
        'font-src': ["'self'"],
        'connect-src': ["'self'"],
        'worker-src': ["'self'"],
        'manifest-src': ["'self'"],
        'base-uri': ["'none'"],
        'frame-ancestors': ["'none'"],
        // A sign-in form is redirected to the provider, and browsers check the redirect too.
        'form-action': ["'self'", providerOrigin],
        ...(secure ? { 'upgrade-insecure-requests': [] } : {}),
      },
    },
  });
}
