/**
 * One e-mail, composed and not yet sent. Whoever composes it writes plain words; `html` says the same as `text` and is
 * made by `letter`. Sender, date and Message-ID are the transport's.
 */
export interface Mail {
  to: { name: string; address: string };
  subject: string;
  text: string;
  html: string;
}
