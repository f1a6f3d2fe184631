import type { Role } from '../../../shared/permissions.ts';

export const FARM = {
  name: 'Saltmarsh Lane Corals',
  timeZone: 'Europe/Lisbon',
  currency: 'EUR',
  address: '7 Saltmarsh Lane\n8700-000 Ria Alta\nPortugal',
  email: 'farm@example.com',
  phone: '+351 000 000 000',
  taxPercent: 2300,
  // A placed order waits for its payment for half a day here, so that the demo has one for a while.
  settings: { holdMinutes: 720 },
} as const;

export const DEMO_PASSWORD = 'demo reef by the weir';

export interface StoreSpec {
  code: string;
  name: string;
  email: string;
  phone: string;
  address: string;
  buyer: string;
}

export const STORES: readonly StoreSpec[] = [
  store('PQR', 'Pier Quarter Reef Room', 'Noor Aydin', 'Rua do Cais 14, Porto Velho'),
  store('BLU', 'The Blue Counter', 'Elsa Vinter', 'Havnegade 3, Nordby'),
  store('TER', 'Terrace Aquaria', 'Luca Ferri', 'Via dei Lecci 22, Collina'),
  store('LOW', 'Low Tide & Daughters', 'Maeve Lowe', '9 Strand Row, Eastmouth'),
  store('KOR', 'Koralle am Markt', 'Jonas Pohl', 'Am Markt 5, Seeheim'),
];

function store(code: string, name: string, buyer: string, address: string): StoreSpec {
  const slug = code.toLowerCase();
  return { code, name, buyer, address, email: `orders.${slug}@example.com`, phone: '+00 000 000 000' };
}

export type StaffKey = 'owner' | 'grower' | 'grower2' | 'sales' | 'viewer';

export const STAFF: readonly { key: StaffKey; role: Role; name: string; email: string }[] = [
  { key: 'owner', role: 'owner', name: 'Marta Quill', email: 'owner@example.com' },
  { key: 'grower', role: 'grower', name: 'Ana Reis', email: 'grower@example.com' },
  { key: 'grower2', role: 'grower', name: 'Tom Brandt', email: 'grower2@example.com' },
  { key: 'sales', role: 'sales', name: 'Jo Lindqvist', email: 'sales@example.com' },
  { key: 'viewer', role: 'viewer', name: 'Peter Vale', email: 'viewer@example.com' },
];
