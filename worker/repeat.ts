export type Repeating = {
  /** Runs again at once, or right after the run that is under way. */
  wake(): void;
  /** Resolves when the run under way has ended. */
  stop(): Promise<void>;
};

/**
 * Runs work over and over, never twice at a time: after each pause, and when woken. A failure is told
 * and the next run comes as if nothing had happened.
 */
export function repeat(options: {
  readonly everyMs: number;
  readonly run: () => Promise<unknown>;
  readonly onError: (error: unknown) => void;
}): Repeating {
  let isStopped = false;
  let isAwake = false;
  let wakeUp: () => void = () => undefined;

  async function pause(): Promise<void> {
    if (isAwake || isStopped) {
      return;
    }
    await new Promise<void>((resolve) => {
      const timer = setTimeout(resolve, options.everyMs);
      wakeUp = () => {
        clearTimeout(timer);
        resolve();
      };
    });
  }

  async function loop(): Promise<void> {
    while (!isStopped) {
      isAwake = false;
      try {
        await options.run();
      } catch (error) {
        options.onError(error);
      }
      await pause();
    }
  }

  const looping = loop();
  return {
    wake() {
      isAwake = true;
      wakeUp();
    },
    async stop() {
      isStopped = true;
      wakeUp();
      await looping;
    },
  };
}
