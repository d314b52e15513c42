/** Words that name a record's kind in a table's kind column. */
import type { RecordKind } from './meanings.ts';
import { plainWords } from './words.ts';

const WORDS: Readonly<Record<RecordKind, string>> = {
  shot:
    'shot|s|fire|fired|firing|pulse|discharge|schuss|puls|entladung|tir|tiro|impulsion|decharge|disparo|pulso|descarga|sparo|impulso|scarica|colpo|' +
    'schot|puls|ontlading|strzal|impuls|wyladowanie|vystrel|vyboj|выстрел|импульс|разряд|ショット|発射|放電|発|发射|脉冲|放电|点火',
  tap:
    'tap|t|hammer|hammer tap|cal|calib|calibration|strike|schlag|hammerschlag|kalibrierung|kal|coup|choc|marteau|etalonnage|calibrage|golpe|martillo|calibracion|' +
    'martello|colpo di martello|taratura|calibrazione|martelo|batida|calibracao|tik|hamer|hamertik|ijking|kalibratie|uderzenie|mlotek|kalibracja|wzorcowanie|' +
    'uder|kladivko|kalibrace|удар|молоток|калибровка|градуировка|打撃|ハンマー|校正|較正|敲击|锤击|标定|校准',
  blank:
    'blank|dummy|dummy load|blocked|plume blocked|shutter|blind|blindschuss|abgedeckt|blockiert|leerschuss|blanc|tir a blanc|charge fictive|bloque|obture|' +
    'blanco|bloqueado|carga ficticia|bianco|bloccato|coperto|carico fittizio|branco|bloqueado|blanco schot|geblokkeerd|afgedekt|slepy|zaslepiony|zaslonieta|' +
    'naslepo|zakryto|холостой|холостая|заслонка|эквивалент|空撃ち|ダミー|遮蔽|空白|空打|遮挡|假负载',
  zero:
    'zero|z|rest|null|nullpunkt|ruhe|nullablesung|repos|cero|reposo|riposo|repouso|nul|rust|spoczynek|nula|klid|ноль|нуль|покой|ゼロ|零点|静止|零|零位',
  freeSwing:
    'free swing|free|swing|ring down|ringdown|ringing down|decay|freischwingung|freie schwingung|ausschwingen|oscillation libre|libre|amortissement|oscilacion libre|' +
    'oscillazione libera|oscilacao livre|livre|vrije slinger|vrije slingering|uitslingeren|swobodne|drgania swobodne|volne kmity|volny kmit|свободные колебания|затухание|' +
    '自由振動|減衰振動|自由摆动|自由衰减',
  weight: 'weight|known weight|load|gewicht|gewichtsstuck|poids|peso|pesa|ciezarek|odwaznik|zavazi|гиря|分銅|おもり|砝码',
  period: 'period|timing|timed|timed swings|periode|schwingungsdauer|periodo|oscilaciones|oscillazioni|okres|perioda|период|周期',
};

const KIND_BY_WORDS: ReadonlyMap<string, RecordKind> = new Map(
  (Object.entries(WORDS) as [RecordKind, string][]).flatMap(([kind, list]) =>
    list.split('|').map((words): [string, RecordKind] => [plainWords(words), kind]),
  ),
);

/** The kind that a word in a kind column names, in any of twelve languages, case and accents aside; a number after it ("tap 3") is passed over. null: not known. */
export function kindOfWord(text: string): RecordKind | null {
  const bare = plainWords(text).replace(/[#\d ]+$/u, '');
  if (bare === '') return null;
  return KIND_BY_WORDS.get(bare) ?? KIND_BY_WORDS.get(bare.replace(/(?:s|e|en|es)$/u, '')) ?? null;
}
