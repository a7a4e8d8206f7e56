import type { Role } from '@/lib/actor';

/** The demo people, one for each role; they exist only in demo mode. */
export const DEMO_PASSWORD = 'saltmarsh-demo-1264';
export const DEMO_PEOPLE: readonly { role: Role; name: string; email: string }[] = [
  { role: 'owner', name: 'Maren Holt', email: 'owner@saltmarsh.example' },
  { role: 'admin', name: 'Tobin Ashe', email: 'admin@saltmarsh.example' },
  { role: 'analyst', name: 'Orla Tennant', email: 'analyst@saltmarsh.example' },
  { role: 'moderator', name: 'Sorrel Wick', email: 'moderator@saltmarsh.example' },
  { role: 'viewer', name: 'Hanne Lode', email: 'viewer@saltmarsh.example' },
];
