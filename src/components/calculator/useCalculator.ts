'use client';

import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import { calculatorHref, readAddress, type CalculatorAddress } from './calculatorAddress';
import { readPane, type Entries, type ReadPane } from './givenOf';
import type { Answer, Outcome, Pane } from './pane';
import { PANES } from './panes';

/** Browsers refuse an address that is changed with every key. */
const SETTLED_MS = 300;

export interface Calculator {
  pane: Pane;
  entries: Entries;
  read: ReadPane;
  outcome: Outcome;
  /** The answer whose working is shown; null while no answer has one. */
  shown: Extract<Answer, { because: null }> | null;
  hrefOf: (pane: Pane) => string;
  enter: (name: string, text: string) => void;
  show: (id: string) => void;
  clear: () => void;
  goTo: (pane: Pane) => void;
  /** The pane after this one, or before it. */
  step: (by: 1 | -1) => void;
}

/** The calculator's state. It lives in the address; what other panes held is kept until the sheet is left. */
export function useCalculator(query: string): Calculator {
  const [address, setAddress] = useState<CalculatorAddress>(() => readAddress(new URLSearchParams(query)));
  const [kept, setKept] = useState<Readonly<Record<string, CalculatorAddress>>>({});
  const { pane, entries } = address;
  const href = calculatorHref(address);
  const opened = useRef(href);

  useEffect(() => {
    // An address that is only looked at stays as it came.
    if (href === opened.current) return;
    opened.current = '';
    const settle = setTimeout(() => {
      const now = `${window.location.pathname}${window.location.search}`;
      if (now !== href) window.history.replaceState(null, '', href);
    }, SETTLED_MS);
    return () => clearTimeout(settle);
  }, [href]);

  useEffect(() => {
    const back = () => setAddress(readAddress(new URLSearchParams(window.location.search)));
    window.addEventListener('popstate', back);
    return () => window.removeEventListener('popstate', back);
  }, []);

  const addressIn = useCallback(
    (to: Pane): CalculatorAddress => kept[to.id] ?? { pane: to, entries: {}, shown: null },
    [kept],
  );
  const goTo = useCallback(
    (to: Pane) => {
      if (to === pane) return;
      const next = addressIn(to);
      // What was typed last may not have settled yet; Back has to find it.
      window.history.replaceState(null, '', href);
      window.history.pushState(null, '', calculatorHref(next));
      setKept((before) => ({ ...before, [pane.id]: address }));
      setAddress(next);
    },
    [address, addressIn, href, pane],
  );

  const read = useMemo(() => readPane(pane, entries), [pane, entries]);
  const outcome = useMemo(() => pane.compute(read.given), [pane, read]);
  const explained = outcome.answers.filter((one) => one.because === null);
  return {
    pane,
    entries,
    read,
    outcome,
    shown: explained.find(({ id }) => id === address.shown) ?? explained[0] ?? null,
    hrefOf: (to) => (to === pane ? href : calculatorHref(addressIn(to))),
    enter: (name, text) => setAddress((before) => ({ ...before, entries: { ...before.entries, [name]: text } })),
    show: (id) => setAddress((before) => ({ ...before, shown: id })),
    clear: () => setAddress({ pane, entries: {}, shown: null }),
    goTo,
    step: (by) => {
      const next = PANES[PANES.indexOf(pane) + by];
      if (next) goTo(next);
    },
  };
}
