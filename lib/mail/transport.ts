import nodemailer, { type Transporter } from 'nodemailer';
import { environment } from '../env';

/** The mail service that is set, or the local fake inbox on the given port. */
export function mailTransport(inboxPort: number | null): Transporter {
  const { SMTP_URL } = environment();
  if (SMTP_URL) return nodemailer.createTransport(SMTP_URL);
  return nodemailer.createTransport({
    host: '127.0.0.1',
    port: inboxPort ?? 0,
    secure: false,
    ignoreTLS: true,
  });
}
