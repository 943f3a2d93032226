import { useEffect, useState } from 'react';
import { useLocation, useNavigate } from 'react-router-dom';

/**
 * The token behind the # of a link from a letter. It is taken out of the address at once, so that it stays in no
 * history, and it never reaches a server's log: a browser does not send what stands behind the #.
 */
export function useHashToken(): string {
  const { hash, pathname } = useLocation();
  const navigate = useNavigate();
  const [token, setToken] = useState(() => hash.slice(1));
  if (hash.length > 1 && hash.slice(1) !== token) setToken(hash.slice(1)); // another link opened on the same page
  useEffect(() => {
    if (hash.length > 1) void navigate(pathname, { replace: true });
  }, [hash, pathname, navigate]);
  return token;
}
