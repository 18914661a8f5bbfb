import { randomInt } from 'node:crypto';

const WORDS = (
  'anchor amber basin beacon bellow bollard bramble brick bridge candle canvas capstan cedar chalk cinder clover cobble compass ' +
  'copper cornice cradle current dormer ember estuary fathom fennel ferry flint gable garnet girder granite gravel gutter halyard ' +
  'hamper hazel heron hollow hopper inlet ivory jetty juniper keel kettle kiln ladder lantern larch lintel lockgate lumber mallet ' +
  'marble marrow meadow mirror mortar mullion nettle oakum orchard oriel osprey parapet pebble pewter pillar plover quarry quill ' +
  'rafter ribbon rigging rudder saffron sailor sandal scaffold shingle signal slate sparrow spindle summit tallow tamarind tarpaulin ' +
  'tiller timber topaz transom trellis tunnel turret velvet verdigris walnut weather whistle willow winter'
).split(' ');

/** Five words drawn at random: no installation shares its demo's password with another. */
export function drawPassword(): string {
  return Array.from({ length: 5 }, () => WORDS[randomInt(WORDS.length)]).join(' ');
}
