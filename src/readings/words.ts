/** The words that people head a readings table with, by role, in twelve languages. */
import type { Role } from './meanings.ts';

/** Lower case, without accents, full-width forms made plain, and anything but letters, digits, '#' and '%' turned to single spaces. */
export function plainWords(text: string): string {
  return text
    .normalize('NFKC')
    .toLowerCase()
    .replace(/ß/g, 'ss')
    .replace(/ł/g, 'l')
    .replace(/ø/g, 'o')
    .normalize('NFD')
    .replace(/[\u0300-\u036f]/g, '')
    .replace(/[^\p{L}\p{M}\p{N}#%]+/gu, ' ')
    .trim();
}

/**
 * Phrases split by '|'. A trailing '*' lets the word go on (stem); phrases in a script without spaces match anywhere.
 * Lists: English, German, French, Spanish, Italian, Portuguese, Dutch, Polish, Czech, Russian, Japanese, Chinese.
 */
const PHRASES: Readonly<Record<Role, string>> = {
  kind:
    'kind|type|record type|what|mode|art|typ|sorte|genre|nature|tipo|clase|soort|rodzaj|druh|тип|вид|род|種類|種別|区分|类型|类别|种类',
  label:
    'shot|shots|shot no|shot number|shot nr|no|nr|number|num|#|id|run|pulse no|fire no|tap|tap no|record|swing no|index|label|' +
    'schuss|schuss nr|schussnr|nummer|lfd nr|versuch|tir|tir n|tir no|numero|essai|coup n|disparo|disparo n|n|n o|num disparo|tiro|colpo|colpo n|prova|' +
    'schot|schot nr|volgnummer|strzal|strzal nr|numer|lp|vystrel|vystrel c|cislo|c|poradi|выстрел|номер|№|импульс no|ショット|番号|回数|発射|编号|序号|发次|次数',
  rest:
    'rest|rest position|rest reading|zero|zero reading|zero before|before|initial|equilibrium|at rest|still|start|x0|x 0|' +
    'ruhe|ruhelage|ruhestellung|null|nullage|nulllage|nullpunkt|vorher|anfang|repos|zero avant|position de repos|avant|equilibre|' +
    'reposo|cero|antes|equilibrio|posicion de reposo|riposo|prima del tiro|repouso|posicao de repouso|rust|ruststand|nulstand|nul|voor|' +
    'spoczynek|polozenie spoczynkowe|spoczynkow*|przed|klid|klidova poloha|klidov*|nula|pred|pokoj|покой|положение покоя|ноль|нуль|до выстрела|начальн*|静止|静止位置|零点|ゼロ|ゼロ点|初期|初期位置|静止读数|零位|初始|初值',
  restAfter:
    'zero after|rest after|after|rest reading after|ruhelage nachher|null nachher|nachher|zero apres|apres|repos apres|cero despues|despues|dopo|zero dopo|depois|na afloop|nul na|po strzale|po vystrelu|после|после выстрела|ноль после|' +
    '射後静止|発射後|射后|发射后|零点后',
  nextSwingDown: 'second swing y|next y|y2|y 2|v2|y3|v3|back swing y',
  restDown: 'rest y|rest row|y0|y 0|v0|ruhe y|repos y',
  firstSwingDown: 'first swing y|peak y|first y|y1|y 1|v1|ausschlag y|pic y',
  firstSwing:
    'first swing|first|first peak|first throw|first deflection|swing 1|swing|throw|deflection|peak|peak 1|1st swing|1st peak|max|maximum|kick|furthest|x1|x 1|a1|p1|right|rechts|droite|derecha|destra|direita|' +
    'erster ausschlag|1 ausschlag|ausschlag|erstausschlag|auslenkung|erste auslenkung|umkehrpunkt|spitze|maximal*|' +
    'premiere elongation|1re elongation|elongation|deviation|premier|premiere|premiere oscillation|deflexion|pic|ecart|' +
    'primera oscilacion|primera|oscilacion|desviacion|deflexion|pico|maximo|primer maximo|' +
    'prima oscillazione|oscillazione|prima|deviazione|deflessione|elongazione|picco|massimo|' +
    'primeira oscilacao|oscilacao|primeira|deflexao|desvio|elongacao|' +
    'eerste uitslag|uitslag|eerste|uitwijking|piek|pierwsze wychylenie|wychylenie|pierwsz*|odchylenie|maksimum|szczyt|' +
    'prvni vychylka|vychylka|prvni|vychyleni|первый|первое отклонение|отклонение|отброс|размах|первый размах|максимум|пик|' +
    '振れ|最大振れ|変位|第一振れ|最初の振れ|ピーク|最大|偏转|偏移|第一摆|首摆|位移|摆幅|峰值|最大偏转|第一次摆动',
  nextSwing:
    'back swing|backswing|return swing|return|back|second swing|second|second peak|2nd swing|2nd peak|third swing|3rd swing|third|fourth swing|4th swing|next|next swing|x2|x3|x4|x5|x 2|x 3|a2|a3|p2|p3|left|links|gauche|izquierda|sinistra|esquerda|' +
    'ruckschwung|ruckschlag|zuruck|zweiter ausschlag|2 ausschlag|3 ausschlag|dritter ausschlag|gegenausschlag|' +
    'retour|elongation retour|elongation de retour|deuxieme|deuxieme elongation|seconde|2e elongation|3e elongation|' +
    'retorno|vuelta|segunda|segunda oscilacion|tercera oscilacion|oscilacion de retorno|ritorno|oscillazione di ritorno|seconda|seconda oscillazione|terza oscillazione|' +
    'volta|segunda oscilacao|oscilacao de retorno|terugslag|terug|terugzwaai|tweede uitslag|tweede|derde uitslag|' +
    'powrot|wychylenie powrotne|powrotn*|drugie wychylenie|zpet|zpetna vychylka|zpetn*|druha vychylka|druha|navrat|' +
    'возврат|обратн*|второй размах|второе отклонение|второй|третий|戻り|戻り振れ|二回目|第二振れ|返回|回摆|第二摆|第二次摆动',
  time:
    'time|when|clock|time of day|hour|timestamp|uhrzeit|zeit|zeitpunkt|heure|temps|hora|tiempo|ora|orario|tempo|tijd|tijdstip|czas|godzina|cas|hodina|время|час|時刻|時間|时间|时刻',
  voltage:
    'volt|volts|voltage|charge voltage|bank voltage|charging voltage|charge|hv|kv|u|uc|spannung|ladespannung|tension|tension de charge|' +
    'voltaje|tension de carga|tensione|tensione di carica|tensao|tensao de carga|spanning|laadspanning|napiecie|napiecie ladowania|napeti|nabijeci napeti|' +
    'напряжение|напряжение заряда|電圧|充電電圧|电压|充电电压',
  pressure:
    'pressure|vacuum|chamber pressure|tank pressure|background pressure|gauge|druck|kammerdruck|vakuum|pression|pression chambre|vide|presion|vacio|pressione|vuoto|pressao|vacuo|' +
    'druk|kamerdruk|cisnienie|proznia|tlak|вакуум|давление|圧力|真空度|真空|气压|压力|压强',
  tapImpulse:
    'hammer impulse|tap impulse|impulse|hammer|known impulse|hammerimpuls|schlagimpuls|impuls|hammer impuls|kraftstoss|impulsion|impulsion du marteau|marteau|' +
    'impulso|impulso del martillo|martillo|impulso del martello|martello|impulso do martelo|martelo|hamer|hamerimpuls|impuls mlotka|mlotek|impuls kladivka|kladivko|' +
    'импульс|импульс молотка|молоток|удар|ハンマー|打撃力積|力積|打撃|锤|锤击冲量|冲量',
  hammerIn:
    'hammer drawn to|drawn to|hammer angle|hammer angle in|hammer in|angle in|drawn back to|hammer raised to|hammer ausgelenkt|hammerwinkel|angle du marteau|angulo del martillo|angolo del martello|' +
    'angulo do martelo|hamerhoek|kat mlotka|uhel kladivka|угол молотка|ハンマー角度|锤角',
  hammerRebound:
    'rebound|rebound angle|rebounds to|hammer rebound|bounced back to|ruckprall|ruckprallwinkel|rebond|angle de rebond|rebote|rimbalzo|ressalto|terugslag hamer|odbicie|odraz|отскок|反発角|反発|回弹',
  hammerFollow:
    'follow through|follow through angle|followed through|follows through to|hammer follow through|hammer out|durchschwung|nachlauf|suite du marteau|paso tras el golpe|prosegue|doorzwaai|проход|通過角|随动',
  tapForce: 'tap force|pulse force|coil force|electrostatic force|calibration force|pulskraft|spulenkraft|force d impulsion|fuerza del pulso|forza dell impulso',
  tapDuration: 'tap duration|force duration|coil pulse length|force pulse length|calibration pulse length|kraftpulsdauer|duree de la force|duracion de la fuerza|durata della forza',
  weight:
    'weight|weights|known weight|load|gewicht|gewichtsstuck|last|poids|poids connu|peso|pesa|pesas|pesi|pesos|gewichten|last|ciezarek|odwaznik|zavazi|гиря|вес гири|分銅|おもり|砝码',
  loading:
    'reading up|loading|up|loading up|going up|reading loading|belastung|ablesung auf|aufwarts|en montant|chargement|charge croissante|lecture montee|subiendo|lectura subida|carga creciente|in salita|carico crescente|' +
    'a subir|op|belasten|w gore|pri zatizeni|вверх|нагрузка|負荷増|加载',
  unloading:
    'reading down|unloading|down|unloading down|going down|reading unloading|entlastung|ablesung ab|abwarts|en descendant|dechargement|charge decroissante|lecture descente|bajando|lectura bajada|carga decreciente|in discesa|carico decrescente|' +
    'a descer|neer|ontlasten|w dol|pri odlehceni|вниз|разгрузка|負荷減|卸载',
  swingsTime:
    'time for|time of swings|time of cycles|timed|timing|period|periods|swing period|swings time|zeit fur|dauer von|schwingungsdauer|schwingungszeit|periode|periodendauer|temps pour|duree de|tiempo de oscilaciones|tiempo para|periodo|' +
    'tempo per|tempo para|tijd voor|slingertijd|trillingstijd|czas wahniec|okres|doba kmitu|perioda|период|время колебаний|周期|振動時間|摆动时间',
  cycles:
    'cycles|swings|no of swings|number of swings|number of cycles|swings timed|cycles timed|oscillations|schwingungen|anzahl schwingungen|perioden|nombre d oscillations|numero de oscilaciones|oscilaciones|numero di oscillazioni|oscillazioni|' +
    'oscilacoes|aantal slingeringen|liczba wahniec|pocet kmitu|число колебаний|колебаний|振動回数|摆动次数',
  amplitude: 'start amplitude|starting amplitude|amplitude at start|amplitude while timing|anfangsamplitude|startamplitude|amplitude initiale|amplitud inicial|ampiezza iniziale|amplitude inicial|beginamplitude|начальная амплитуда|初期振幅|初始振幅',
  massHung:
    'mass hung|hung mass|added mass|mass added|extra mass|calibration mass|zusatzmasse|angehangte masse|masse ajoutee|masse suspendue|masa anadida|masa colgada|massa aggiunta|massa appesa|massa adicionada|toegevoegde massa|' +
    'masa dodatkowa|pridana hmotnost|добавленная масса|付加質量|附加质量',
  massHungAt:
    'hung at|mass at|at radius|radius|radius of the mass|mass radius|distance of mass|place of the mass|radius der masse|abstand der masse|a la distance|rayon|radio|raggio|raio|straal|promien|polomer|радиус|半径',
  maximumTime: 'time to first maximum|time to the first maximum|time to maximum|time to peak|peak time|zeit bis zum ersten ausschlag|zeit bis maximum|temps au premier maximum|temps de montee|tiempo al primer maximo|tempo al primo massimo|время до максимума|最大到達時間|到达最大时间',
  swingBefore:
    'swing before|swing before shot|swing before the shot|still swinging|swinging before|background swing|residual swing|residual amplitude|amplitude before|amplitude before the shot|restschwingung|schwingung vorher|amplitude vorher|' +
    'oscillation avant|amplitude avant|oscilacion previa|amplitud previa|oscillazione prima|ampiezza prima|oscilacao anterior|uitslag vooraf|wahanie przed|kmit pred|колебание до|射前振れ|射前摆动',
  timeSinceMaximum:
    'time since maximum|time since its maximum|since maximum|since the maximum|time after maximum|time since turning point|time from turning point|since turning point|zeit seit maximum|zeit seit umkehrpunkt|' +
    'temps depuis le maximum|tiempo desde el maximo|tempo dal massimo|tempo desde o maximo|tijd sinds maximum|czas od maksimum|cas od maxima|время от максимума|最大からの時間|距最大时间',
  note:
    'note|notes|remark|remarks|comment|comments|seen|bemerkung|bemerkungen|notiz|anmerkung|kommentar|remarque|remarques|commentaire|observation|observations|' +
    'nota|notas|comentario|comentarios|observacion|observaciones|commento|osservazioni|observacao|observacoes|opmerking|opmerkingen|uwaga|uwagi|poznamka|poznamky|' +
    'примечание|примечания|замечание|заметка|備考|メモ|注記|备注|说明|注',
  ignored:
    'impulse bit|i bit|ibit|mass|temperature|temp|energy|capacitance|current|date|' +
    'datum|masse|temperatur|energie|kapazitat|strom|fecha|masa|temperatura|energia|data|massa|дата|日付|質量|温度|日期|质量',
};

interface Phrase {
  readonly role: Role;
  readonly words: string;
}

const SCRIPT_WITHOUT_SPACES = /[\p{Script=Han}\p{Script=Hiragana}\p{Script=Katakana}]/u;

/** Phrases of whole words by themselves; the most words that one has. */
const WHOLE = new Map<string, Role>();
const STEMS: Phrase[] = [];
const ANYWHERE: Phrase[] = [];
for (const [role, list] of Object.entries(PHRASES) as [Role, string][]) {
  for (const raw of list.split('|')) {
    const words = plainWords(raw.replace(/\*$/, ''));
    if (words === '') continue;
    if (SCRIPT_WITHOUT_SPACES.test(raw)) ANYWHERE.push({ role, words });
    else if (raw.endsWith('*')) STEMS.push({ role, words });
    else if (!WHOLE.has(words)) WHOLE.set(words, role);
  }
}
const MOST_WORDS = Math.max(...[...WHOLE.keys()].map((words) => words.split(' ').length));

/** The longest known phrase in a header; the first of the list where two are as long. */
function longestPhrase(bare: string): Phrase | null {
  let best: Phrase | null = null;
  const offer = (role: Role, words: string): void => {
    if (best === null || words.length > best.words.length) best = { role, words };
  };
  const tokens = bare.split(' ');
  for (let from = 0; from < tokens.length; from++) {
    for (let to = from + 1; to <= Math.min(tokens.length, from + MOST_WORDS); to++) {
      const words = tokens.slice(from, to).join(' ');
      const role = WHOLE.get(words);
      if (role !== undefined) offer(role, words);
    }
  }
  const padded = ` ${bare}`;
  for (const { role, words } of STEMS) if (padded.includes(` ${words}`)) offer(role, words);
  if (SCRIPT_WITHOUT_SPACES.test(bare)) for (const { role, words } of ANYWHERE) if (bare.includes(words)) offer(role, words);
  return best;
}

/** What a header says: the role, the phrase that told it, and how much of the header the phrase covers (0…1). */
export interface HeaderRead {
  readonly role: Role;
  readonly phrase: string;
  readonly covers: number;
}

/** Longer cells are text, not headers, and are not searched for words and units. */
export const LONGEST_HEADER = 120;

/** Role told by a header's words, unit and brackets left aside; the longest phrase wins. null where no word is known. */
export function roleOfHeader(header: string): HeaderRead | null {
  if (header.length > LONGEST_HEADER) return null;
  const bare = plainWords(header.replace(/[([{][^)\]}]*[)\]}]\s*$/u, ' ')) || plainWords(header);
  if (bare === '') return null;
  const counted = /(?:^| )(?:swing|throw|peak|deflection|ausschlag|elongation|oscil\w*|uitslag|wychylenie|vychylka|размах|x|a|p) ?(\d+)(?: |$)/u.exec(bare);
  if (counted?.[1] !== undefined) {
    const n = Number(counted[1]);
    if (n === 1) return { role: 'firstSwing', phrase: counted[0].trim(), covers: 1 };
    if (n >= 2 && n < 100) return { role: 'nextSwing', phrase: counted[0].trim(), covers: 1 };
  }
  const best = longestPhrase(bare);
  return best === null ? null : { role: best.role, phrase: best.words, covers: best.words.length / bare.length };
}
