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
