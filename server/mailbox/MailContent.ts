/** What an e-mail says: made from plain data by one pure function a kind. */
export interface MailContent {
  subject: string;
  text: string;
  html: string;
}
