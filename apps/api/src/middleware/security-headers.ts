import helmet from 'helmet'

/** Pages load nothing from elsewhere and run no script that is not a file of ours. */
export function securityHeaders(publicUrl: string) {
  const isHttps = publicUrl.startsWith('https:')
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        scriptSrc: ["'self'"],
        styleSrc: ["'self'"],
        imgSrc: ["'self'", 'data:', 'blob:'],
        fontSrc: ["'self'"],
        mediaSrc: ["'self'", 'blob:'],
        connectSrc: ["'self'"],
        workerSrc: ["'self'"],
        objectSrc: ["'none'"],
        baseUri: ["'none'"],
        formAction: ["'self'"],
        frameAncestors: ["'none'"],
      },
    },
    strictTransportSecurity: isHttps ? { maxAge: 31_536_000, includeSubDomains: true } : false,
    crossOriginEmbedderPolicy: false,
    // On plain HTTP other than loopback browsers ignore it and complain in the console.
    crossOriginOpenerPolicy: isHttps,
    originAgentCluster: isHttps,
    referrerPolicy: { policy: 'no-referrer' },
    xFrameOptions: { action: 'deny' },
  })
}
