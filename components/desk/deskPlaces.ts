import type { DeskPlace } from './DeskFrame';

const places = [
  { href: '/desk', title: 'Sessions' },
  { href: '/desk/devices', title: 'Devices' },
  { href: '/desk/people', title: 'People' },
];

/** The places of the desk, and which of them an address belongs to. */
export function placesAt(path: string): DeskPlace[] {
  const isElsewhere = places.slice(1).some(({ href }) => path.startsWith(href));
  return places.map(({ href, title }) => ({
    href,
    title,
    isCurrent: href === '/desk' ? !isElsewhere : path.startsWith(href),
  }));
}

/** The sign-in, with the way back to where somebody wanted to go. */
export function signInHref(path: string): string {
  const wanted = `${path}${typeof window === 'undefined' ? '' : window.location.search}`;
  return wanted === '/desk' ? '/desk/sign-in' : `/desk/sign-in?next=${encodeURIComponent(wanted)}`;
}

/** Where to go once signed in: only ever to a place of the desk. */
export function placeAfterSignIn(next: string | undefined): string {
  return next !== undefined && /^\/desk(?:[/?]|$)/.test(next) && !next.startsWith('/desk/sign-in')
    ? next
    : '/desk';
}
