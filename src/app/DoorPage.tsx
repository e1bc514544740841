import type { ReactNode } from "react";
import { ProductMark } from "../components/ui/ProductMark.tsx";
import { SignInSheet } from "../features/accounts/SignInSheet.tsx";

interface DoorPageProps {
  /** In the window's title. */
  readonly here: string;
  /** What the page has to say; without it the product says what it is for. */
  readonly title?: ReactNode;
  readonly children: ReactNode;
}

/** A page before anybody is signed in: the sheet at the left, what is asked at the right. */
export function DoorPage({ here, title, children }: DoorPageProps) {
  const name = (
    <>
      <ProductMark size={title === undefined ? 48 : 28} />
      Quillet
    </>
  );
  return (
    <div className="q-sign-in">
      <title>{`${here} · Quillet`}</title>
      <div className="q-sign-in-picture">
        <SignInSheet />
      </div>
      <main className="q-sign-in-text">
        {title === undefined ? (
          <h1 className="q-sign-in-name">{name}</h1>
        ) : (
          <>
            <p className="q-sign-in-mark">{name}</p>
            <h1 className="q-sign-in-title">{title}</h1>
          </>
        )}
        {children}
      </main>
    </div>
  );
}
