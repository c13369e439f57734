/** Time, so that tests need not wait for it. */
export interface Clock {
  /** Calls back once after so many milliseconds, unless the returned function is called before. */
  after(milliseconds: number, callback: () => void): () => void;
}

export const realClock: Clock = {
  after(milliseconds, callback) {
    const timer = setTimeout(callback, milliseconds);
    return () => clearTimeout(timer);
  },
};
