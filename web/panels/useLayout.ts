import { useEffect, useState } from 'preact/hooks';

export type Layout = 'phone' | 'tablet' | 'wide';

const PHONE = '(max-width: 760px)';
const WIDE = '(min-width: 1200px)';

function present(): Layout {
  if (matchMedia(PHONE).matches) return 'phone';
  return matchMedia(WIDE).matches ? 'wide' : 'tablet';
}

/** The order that the sheet's blocks stand in: for a reader who goes through it as well as for the eye. */
export function useLayout(): Layout {
  const [layout, setLayout] = useState(present);
  useEffect(() => {
    const queries = [matchMedia(PHONE), matchMedia(WIDE)];
    const change = () => setLayout(present());
    for (const query of queries) query.addEventListener('change', change);
    return () => {
      for (const query of queries) query.removeEventListener('change', change);
    };
  }, []);
  return layout;
}
