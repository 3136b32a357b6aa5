import type { ReactNode } from 'react';
import './sign-in.css';

/** The page before there is a sign-in. */
export const SignInFrame = ({ title, children }: { title: string; children: ReactNode }) => (
  <main className="sign-in">
    <p className="sign-in-mark">
      <img src="/mark.svg" alt="" width="28" height="28" /> Hubtack
    </p>
    <h1>{title}</h1>
    {children}
  </main>
);
