import { useEffect, useState } from 'react';
import { NavigationType, useLocation, useNavigationType, useSearchParams } from 'react-router-dom';
import { formOf, type RobustForm, searchOf } from './robust-form';

// Some browsers stop a page that changes its address more than some three times a second.
const ADDRESS_AFTER_MS = 300;

/** The question as typed, with the page's address kept up to date (replaced, never pushed), so that it can be sent. */
export function useRobustForm() {
  const [search, setSearch] = useSearchParams();
  const { key } = useLocation();
  const navigation = useNavigationType();
  const [form, setForm] = useState<RobustForm>(() => formOf(search));
  const [touched, setTouched] = useState(false);
  const [seenKey, setSeenKey] = useState(key);
  if (key !== seenKey) {
    setSeenKey(key);
    // Only this page replaces its own address, and then what is typed may already be further on.
    if (navigation !== NavigationType.Replace) setForm(formOf(search));
  }

  const address = searchOf(form).toString();
  const stands = search.toString();
  useEffect(() => {
    if (!touched || address === stands) return undefined;
    const timer = window.setTimeout(() => {
      setSearch(address, { replace: true, preventScrollReset: true });
    }, ADDRESS_AFTER_MS);
    return () => window.clearTimeout(timer);
  }, [touched, address, stands, setSearch]);

  return {
    form,
    change: (part: Partial<RobustForm>) => {
      setTouched(true);
      setForm((before) => ({ ...before, ...part }));
    },
    /** A question that was asked belongs in the address even where nothing was changed. */
    settle: () => setTouched(true),
  };
}
