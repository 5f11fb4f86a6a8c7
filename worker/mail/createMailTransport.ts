import nodemailer, { type Transporter } from 'nodemailer';

/** Times are bounded so that a silent mail server can't hold a row in `sending` for long. */
export function createMailTransport(smtpUrl: string): Transporter {
  return nodemailer.createTransport(smtpUrl, {
    connectionTimeout: 10_000,
    greetingTimeout: 10_000,
    socketTimeout: 30_000,
  } as object);
}
