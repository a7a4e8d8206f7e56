export { initials, placeHref, PLACES, type NavItem, type Place, type ShellData } from './shell';
