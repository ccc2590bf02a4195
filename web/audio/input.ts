/**
 * Live input: what a device hears, as it is. Echo cancellation, noise suppression and gain control are asked to be off, since they would be heard as the
 * cell's doing.
 */

export interface InputDevice {
  readonly id: string;
  /** Empty until the browser was allowed to listen. */
  readonly title: string;
}

export interface LiveInput {
  readonly title: string;
  readonly deviceId: string;
  readonly sampleRateHz: number;
  readonly channels: number;
  /** From the device to the page as the browser states it; null where it does not. */
  readonly latencySec: number | null;
  /** What the browser would not switch off, in words. */
  readonly keptOn: readonly string[];
  readonly stream: MediaStream;
  end(): void;
}

export interface Inputs {
  list(): Promise<readonly InputDevice[]>;
  /** Asks for permission where it must. `ended` is called when the device goes away by itself. Rejects with a sentence. */
  open(deviceId: string | null, ended: (input: LiveInput) => void): Promise<LiveInput>;
  /** The rate that an open input has now, Hz. */
  rateHz(input: LiveInput): number;
  /** Calls back whenever a device comes or goes. */
  watch(changed: () => void): void;
}

const RATE_IF_UNKNOWN_HZ = 48000;
const MOST_CHANNELS = 2;
const PROCESSING = [
  ['echoCancellation', 'echo cancellation'],
  ['noiseSuppression', 'noise suppression'],
  ['autoGainControl', 'automatic gain control'],
] as const;

export function browserInputs(): Inputs {
  const devices = navigator.mediaDevices as MediaDevices | undefined;
  return {
    async list() {
      const all = (await devices?.enumerateDevices()) ?? [];
      return all.filter(({ kind }) => kind === 'audioinput').map(({ deviceId, label }) => ({ id: deviceId, title: label }));
    },
    async open(deviceId, ended) {
      if (devices?.getUserMedia === undefined) throw new Error('This browser lets no page listen to an input at this address.');
      const stream = await devices.getUserMedia({ audio: wishes(deviceId) }).catch((error) => {
        throw new Error(refusal(error));
      });
      const [track] = stream.getAudioTracks();
      const input = describe(track, stream);
      track.addEventListener('ended', () => ended(input));
      return input;
    },
    rateHz: ({ stream }) => rateOf(stream.getAudioTracks()[0].getSettings()),
    watch: (changed) => devices?.addEventListener('devicechange', changed),
  };
}

function wishes(deviceId: string | null): MediaTrackConstraints {
  return {
    ...(deviceId === null ? {} : { deviceId: { exact: deviceId } }),
    echoCancellation: false,
    noiseSuppression: false,
    autoGainControl: false,
    channelCount: { ideal: MOST_CHANNELS },
  };
}

function describe(track: MediaStreamTrack, stream: MediaStream): LiveInput {
  // `latency` is of the specification, not yet in the standard type library.
  const settings = track.getSettings() as MediaTrackSettings & { latency?: number };
  return {
    title: track.label || 'input without a name',
    deviceId: settings.deviceId ?? '',
    sampleRateHz: rateOf(settings),
    channels: Math.max(1, Math.min(MOST_CHANNELS, settings.channelCount ?? 1)),
    latencySec: settings.latency ?? null,
    keptOn: PROCESSING.filter(([key]) => settings[key] === true).map(([, words]) => words),
    stream,
    end: () => track.stop(),
  };
}

function rateOf({ sampleRate }: MediaTrackSettings): number {
  return sampleRate ?? RATE_IF_UNKNOWN_HZ;
}

/** By the error's name, as the Media Capture specification has them. */
const REFUSALS: Readonly<Record<string, string>> = {
  NotAllowedError:
    'The browser was not allowed to listen to an input; allow the microphone for this address, then choose live input again.',
  NotFoundError: 'This machine has no sound input; plug one in, then choose live input again.',
  NotReadableError: 'The input cannot be read; another program may hold it.',
  OverconstrainedError: 'The input that was chosen is gone; choose another one.',
};

function refusal(error: unknown): string {
  const { name = '', message = String(error) } = error instanceof Error ? error : {};
  return REFUSALS[name] ?? `The input cannot be opened; the browser says: ${message}.`;
}
