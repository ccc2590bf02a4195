/** Why the browser refused to keep or to give back, in words that can follow a colon. */
export function reasonOf(error: unknown): string {
  if (!(error instanceof Error)) return String(error);
  switch (error.name) {
    case 'QuotaExceededError':
      return 'it has no more room for this page';
    case 'NotFoundError':
      return 'it is no longer there';
    case 'SecurityError':
      return 'it keeps nothing for pages in this window';
    case 'VersionError':
      return 'a newer Fettle has been here; reload the page to get it';
    default:
      return error.message || error.name;
  }
}
