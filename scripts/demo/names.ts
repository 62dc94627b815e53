import type { Draw } from './draw';

/** Given names and family names put together at random: any likeness to a living person is chance. */
const given = [
  'Ada', 'Agnes', 'Amara', 'Anouk', 'Beatrix', 'Brigid', 'Calla', 'Carys', 'Celia', 'Clover', 'Corinne', 'Dagny', 'Dilys', 'Edith', 'Elowen', 'Emmeline', 'Esme', 'Fern', 'Freya', 'Greer',
  'Hana', 'Heloise', 'Ines', 'Iona', 'Isolde', 'Jocasta', 'Juniper', 'Kerensa', 'Lavinia', 'Leonie', 'Liesl', 'Lorna', 'Mabel', 'Maren', 'Merle', 'Morwenna', 'Nadia', 'Nerys', 'Odette', 'Olwen',
  'Petra', 'Philippa', 'Quilla', 'Ramona', 'Rosalind', 'Rowan', 'Sabine', 'Selma', 'Sigrid', 'Tamsin', 'Thea', 'Una', 'Ursula', 'Verity', 'Vida', 'Willa', 'Yara', 'Zelda', 'Zinnia', 'Wren',
] as const;
const family = [
  'Alderby', 'Anstey', 'Barrowcliff', 'Beckwith', 'Birchall', 'Blythe', 'Bramley', 'Calloway', 'Cardew', 'Chilcott', 'Coldbrook', 'Copley', 'Dacre', 'Danvers', 'Dunmore', 'Easterby', 'Ellery', 'Fairholm', 'Fenwick', 'Fosdyke',
  'Garland', 'Gillow', 'Hallam', 'Harker', 'Haverley', 'Hollin', 'Inskip', 'Jessop', 'Kellaway', 'Kirkby', 'Lathom', 'Lindale', 'Loxley', 'Marchbank', 'Merrow', 'Milburn', 'Netherby', 'Oakshott', 'Orchard', 'Paget',
  'Pendry', 'Quayle', 'Ravenel', 'Redfern', 'Rushby', 'Sallow', 'Selwick', 'Sparrow', 'Stannard', 'Tallis', 'Thornbury', 'Tregear', 'Underhill', 'Varley', 'Wainfleet', 'Whitlow', 'Winslade', 'Wycombe', 'Yardley', 'Yewdall',
] as const;

export interface Identity {
  readonly name: string;
  readonly email: string;
  readonly phone: string;
}

/** A name with an address and a number that lead nowhere: 01632 960 and 5550 are kept free for fiction by the regulators (from memory). */
export function inventIdentity(draw: Draw, tag: string, timeZone: string): Identity {
  const first = draw.pick(given);
  const last = draw.pick(family);
  const three = String(draw.whole(0, 999)).padStart(3, '0');
  return {
    name: `${first} ${last}`,
    email: `${first}.${last}.${tag}@post.example`.toLowerCase(),
    phone: timeZone.startsWith('Australia') ? `(03) 5550 0${three}` : `01632 960${three}`,
  };
}
