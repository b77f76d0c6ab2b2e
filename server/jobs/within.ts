/** The result of work, or a refusal once the time is over; the work itself is not stopped. */
export async function within<Result>(
  milliseconds: number,
  what: string,
  work: Promise<Result>,
): Promise<Result> {
  let timer: NodeJS.Timeout | undefined;
  const deadline = new Promise<never>((_resolve, reject) => {
    timer = setTimeout(() => {
      reject(new Error(`${what} took longer than ${milliseconds} ms.`));
    }, milliseconds);
  });
  try {
    return await Promise.race([work, deadline]);
  } finally {
    clearTimeout(timer);
  }
}
