/** j and k go to the next and previous card from anywhere but a field; arrow keys do when a card itself has the focus. */
export function moveFocus(e: KeyboardEvent): void {
  if (e.ctrlKey || e.metaKey || e.altKey || !(e.target instanceof HTMLElement)) return;
  if (e.target.matches('input, select, textarea')) return;
  const onCard = e.target.matches('[data-card]');
  const step =
    e.key === 'j' || (onCard && e.key === 'ArrowDown')
      ? 1
      : e.key === 'k' || (onCard && e.key === 'ArrowUp')
        ? -1
        : 0;
  if (step === 0) return;
  const cards = [...document.querySelectorAll<HTMLElement>('[data-card]')];
  const here = e.target.closest<HTMLElement>('[data-card]');
  const at = here ? cards.indexOf(here) + step : step > 0 ? 0 : cards.length - 1;
  const next = cards.at(Math.max(0, Math.min(cards.length - 1, at)));
  if (!next) return;
  e.preventDefault();
  next.focus({ preventScroll: true });
  next.scrollIntoView({ block: 'start' });
}
