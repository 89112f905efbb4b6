/** A labelled value of a mail's list of facts. */
export interface Fact {
  readonly label: string;
  readonly value: string;
}

/** A part of a mail. What is written here is plain text; the layouts escape it and lay it out. */
export type Block =
  | { readonly type: 'paragraph'; readonly text: string }
  /** A dose with its unit, set large. */
  | { readonly type: 'dose'; readonly label: string; readonly dose: string }
  | { readonly type: 'facts'; readonly facts: readonly Fact[] }
  /** The one thing to do: a link into the installation, its path beginning with a slash. */
  | { readonly type: 'action'; readonly label: string; readonly path: string }
  | { readonly type: 'caution' };

/** A mail as written, before it is laid out: HTML and text are both made of this. */
export interface Message {
  readonly subject: string;
  /** What a mailbox shows beside the subject. No dose: there it would stand without its caution. */
  readonly preheader: string;
  readonly title: string;
  /** A halt is set off by its colour, beside its words. */
  readonly tone: 'plain' | 'halt';
  readonly blocks: readonly Block[];
  /** Why the reader gets it, as the end of the sentence "For …, because …". */
  readonly because: string;
  /** The head of the trial's chain when it happened; null in mails about no trial. */
  readonly chainHead: string | null;
}

/** What the layouts need beside the message. */
export interface MailContext {
  /** The installation's public address without a slash at its end; every link begins with it. */
  readonly url: string;
  /** The reader's printed name, where it is known. */
  readonly recipientName: string | null;
}
