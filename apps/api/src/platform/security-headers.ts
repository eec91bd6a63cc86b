import helmet from 'helmet';
import { findPublicOrigin } from '@masswright/storage';
import type { ApiSettings } from './api-settings';

/** The page may load from the app alone, and talk to it and to the storage; nobody may frame it. */
export function securityHeaders(settings: ApiSettings) {
  const storageOrigin = findPublicOrigin({
    endpoint: settings.S3_ENDPOINT,
    publicEndpoint: settings.S3_PUBLIC_ENDPOINT,
    bucket: settings.S3_BUCKET,
    forcePathStyle: settings.S3_FORCE_PATH_STYLE,
  });
  const isSecure = settings.PUBLIC_URL.startsWith('https:');
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'none'"],
        scriptSrc: ["'self'"],
        styleSrc: ["'self'"],
        imgSrc: ["'self'", 'data:', 'blob:'],
        fontSrc: ["'self'"],
        connectSrc: ["'self'", storageOrigin],
        workerSrc: ["'self'", 'blob:'],
        manifestSrc: ["'self'"],
        formAction: ["'self'"],
        frameAncestors: ["'none'"],
        baseUri: ["'none'"],
        ...(isSecure ? { upgradeInsecureRequests: [] } : {}),
      },
    },
    strictTransportSecurity: isSecure ? { maxAge: 31_536_000, includeSubDomains: false } : false,
    crossOriginEmbedderPolicy: false,
    referrerPolicy: { policy: 'no-referrer' },
  });
}
