/**
 * Whether the pane is drawn dark: as the spreadsheet program says, otherwise as the system prefers.
 */
import { useEffect, useState } from 'react';

const darkQuery = '(prefers-color-scheme: dark)';

export function useIsDark(isHostDark: boolean | null): boolean {
  const [prefersDark, setPrefersDark] = useState(() => window.matchMedia(darkQuery).matches);
  useEffect(() => {
    const query = window.matchMedia(darkQuery);
    const follow = (): void => setPrefersDark(query.matches);
    query.addEventListener('change', follow);
    return () => query.removeEventListener('change', follow);
  }, []);
  return isHostDark ?? prefersDark;
}
