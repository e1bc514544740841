/** One mail on its way out. */
export interface Letter {
  readonly to: { readonly name: string; readonly address: string };
  readonly subject: string;
  readonly text: string;
  readonly html: string;
}

/** An SMTP server that takes letters. */
export interface MailServer {
  /** Host and port, never user or password. */
  readonly name: string;
  readonly from: string;
  /** Resolves when the server has taken it; rejects with what it said. */
  send(letter: Letter): Promise<void>;
  close(): void;
}
