/** Coined names of the demo house; nobody of these exists. */
export const HOUSE = { name: 'Ostrey & Tarn', town: 'Saltcaster', zone: 'Europe/Brussels' };

export const PEOPLE = [
  { name: 'R. Ostrey', roles: ['owner'] },
  { name: 'I. Tarn', roles: ['dealer'] },
  { name: 'S. Vareld', roles: ['buyer'] },
  { name: 'J. Mavvin', roles: ['bookkeeper'] },
] as const;
export const RETAILER = {
  name: 'M. Tessaly',
  email: 'm.tessaly@tessaly-rook.example',
  customer: 'Tessaly & Rook',
};

export const CUSTOMERS = [
  ['Vellimoor & Sons', 'Kelderholt'],
  ['Halvik Rings', 'Halvik'],
  ['Corrin Vale Settings', 'Corrin Vale'],
  ['Marchbeck Jewellers', 'Marchbeck'],
  ['Pellwyn Jewellers', 'Dunmarrow'],
  ['Tessaly & Rook', 'Saltcaster'],
  ['Oskarine Studio', 'Vintersay'],
  ['Dunmarrow Gold Co-op', 'Dunmarrow'],
  ['Lindgate Rings', 'Lindgate'],
  ['Ferrow & Daughters', 'Averquay'],
  ['Brunmoor Goldsmiths', 'Brunmoor'],
  ['Ansorel & Pike', 'Quillhaven'],
  ['Corvandel Bench', 'Ostmarrow'],
  ['Quennoway Rings', 'Quillhaven'],
  ['Ildermoor Goldsmiths', 'Ostmarrow'],
  ['Tavvick Jewellers', 'Marchbeck'],
  ['Brestowyn & Daughter', 'Lindgate'],
  ['Osperlin Studio', 'Averquay'],
  ['Yarrovell Settings', 'Kelderholt'],
  ['Kazzimere Bench', 'Brunmoor'],
  ['Wendrassil Rings', 'Halvik'],
  ['Umbrisk & Thoyle', 'Vintersay'],
] as const;
export const SUPPLIERS = [
  ['Keldavar Stones', 'Averquay'],
  ['Mestrine Stones', 'Quillhaven'],
  ['Hathrow & Velk', 'Vintersay'],
  ['Zelmy Brothers', 'Kelderholt'],
  ['Antrell Polishing', 'Ostmarrow'],
  ['Orsolo Cutting', 'Averquay'],
  ['Drassoval Stones', 'Halvik'],
  ['Immerkoth Cutting', 'Kelderholt'],
  ['Palverine Polishing', 'Lindgate'],
  ['Sorvantell Stones', 'Saltcaster'],
  ['Vazhorel Brothers', 'Quillhaven'],
  ['Okthavar & Daughters', 'Ostmarrow'],
] as const;
export const CONSIGNORS = [
  ['Belthamar & Odrin', 'Saltcaster'],
  ['Grenovaz Estate', 'Vintersay'],
  ['Nostrevel Vault', 'Averquay'],
  ['Yssandor Heirs', 'Marchbeck'],
] as const;
export const WORKSHOPS = [
  ['L. Brasket', 'Saltcaster'],
  ['Thessock Bench', 'Saltcaster'],
  ['Arvinel Recutting', 'Ostmarrow'],
  ['E. Moltrik', 'Dunmarrow'],
] as const;
export const LABORATORIES = ['Norvane', 'Aldmere', 'Quellisar'] as const;
