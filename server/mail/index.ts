export { isPlainAddress, type Mailbox, mailboxOf } from './mailbox';
export { mailWorker } from './mail-worker';
export { type Mail, queueMail } from './outbox';
