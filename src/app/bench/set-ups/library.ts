import {BOARD_SHEETER} from './board-sheeter';
import {COATER_1} from './coater-1';
import {FILM_SLITTER} from './film-slitter';
import {FOIL_COATER} from './foil-coater';
import {LABEL_PRESS} from './label-press';
import {NEWSPRINT_PRESS} from './newsprint-press';
import {NONWOVEN_LINE} from './nonwoven-line';
import {POLYESTER_COATER} from './polyester-coater';
import {TAPE_SLITTER} from './tape-slitter';
import {TISSUE_CONVERTER} from './tissue-converter';
import {type SetUp} from './stand';

/** The stands to choose from; the first is the one a first visit finds. */
export const SET_UPS: readonly SetUp[] = [
  COATER_1,
  BOARD_SHEETER,
  FILM_SLITTER,
  FOIL_COATER,
  LABEL_PRESS,
  NEWSPRINT_PRESS,
  NONWOVEN_LINE,
  POLYESTER_COATER,
  TAPE_SLITTER,
  TISSUE_CONVERTER,
];

/** Those that the Bench offers: its picture and its trend do not show a dancer yet. */
export const OFFERED = SET_UPS.filter(({scenario}) => scenario.sensing.kind === 'loadCell');

/** The set-up of this key, or the first for a key that no longer exists. */
export function setUpOf(key: string | undefined): SetUp {
  return SET_UPS.find((each) => each.key === key) ?? COATER_1;
}
