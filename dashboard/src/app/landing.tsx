import { useState, type ReactNode } from 'react';
import { Navigate, NavigationType, useNavigationType } from 'react-router-dom';
import { useMe } from '../lib/session';

const PHONE = '(max-width: 600px)';

/** Where the sign-in leads: a crew chief on a phone comes to the own crew, and reaches the board from there. */
export function Landing({ children }: { children: ReactNode }) {
  const { role } = useMe();
  const arrival = useNavigationType();
  // Signing in replaces its own entry; somebody who chose the board, or reads it anew, stays there.
  const [goesOn] = useState(
    () => role === 'crewChief' && arrival === NavigationType.Replace && matchMedia(PHONE).matches,
  );
  return goesOn ? <Navigate to="/my-crew" replace /> : children;
}
