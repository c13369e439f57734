import type { LoggerService } from '@nestjs/common';
import { type Logger, pino } from 'pino';

/** Structured logs to standard output; neither secrets nor personal data are ever passed in. */
export const createLogger = (level: string): Logger =>
  pino({ level, base: null, timestamp: pino.stdTimeFunctions.isoTime });

/** Lets Nest's own logger write through pino. */
export class NestLogger implements LoggerService {
  constructor(private readonly pino: Logger) {}

  log(message: unknown, ...rest: unknown[]): void {
    this.write('info', message, rest);
  }
  error(message: unknown, ...rest: unknown[]): void {
    this.write('error', message, rest);
  }
  warn(message: unknown, ...rest: unknown[]): void {
    this.write('warn', message, rest);
  }
  debug(message: unknown, ...rest: unknown[]): void {
    this.write('debug', message, rest);
  }
  verbose(message: unknown, ...rest: unknown[]): void {
    this.write('debug', message, rest);
  }

  /** Nest puts the context last; `logger.warn({…fields}, 'words')` gives fields and words. */
  private write(level: 'info' | 'error' | 'warn' | 'debug', message: unknown, rest: unknown[]): void {
    const context = rest.at(-1);
    const words = rest.slice(0, -1).filter((part) => typeof part === 'string');
    if (typeof message === 'object' && message !== null)
      this.pino[level]({ context, ...message }, words.join(' '));
    else this.pino[level]({ context }, [String(message), ...words].join(' '));
  }
}
