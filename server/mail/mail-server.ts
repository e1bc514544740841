/** One mail on its way out. */
export interface Letter {
  /** Names it in its Message-ID: a mail that goes out twice can be seen to be the same. */
  readonly id: string;
  readonly to: { readonly name: string; readonly address: string };
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

/** Why a mail was not taken. */
export class MailRefused extends Error {
  /** For ever: this mail to this address. Else it may go later. */
  readonly forEver: boolean;
  /** Whether it is about this one mail, so that others may still go. */
  readonly others: boolean;

  constructor(words: string, { forEver, others }: { readonly forEver: boolean; readonly others: boolean }) {
    super(words);
    this.name = "MailRefused";
    this.forEver = forEver;
    this.others = others;
  }
}

/** An SMTP server that takes letters. */
export interface MailServer {
  /** Host and port, never user or password. */
  readonly name: string;
  readonly from: string;
  /** Resolves when the server has taken it; rejects with a `MailRefused`. */
  send(letter: Letter): Promise<void>;
  close(): void;
}
