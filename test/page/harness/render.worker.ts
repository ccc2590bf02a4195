/** The renders of test/support/sameRenders.ts, in a worker. */
import { renderNamed, sha256 } from '../../support/sameRenders.ts';

self.onmessage = async ({ data }: MessageEvent<string>) => {
  self.postMessage(await sha256(renderNamed(data)));
};
