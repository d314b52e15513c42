/** The words that people head the columns of a sampled record with, by use, in twelve languages. */
import { plainWords } from '../words.ts';

export type SampledUse = 'time' | 'sample' | 'frame' | 'trigger' | 'voltage' | 'reading' | 'down' | 'pivotAcross' | 'pivotDown';

type Listed = Exclude<SampledUse, 'pivotAcross' | 'pivotDown'>;

/**
 * Phrases split by '|'; a trailing '*' lets the word go on; phrases in a script without spaces match anywhere.
 * Lists: English, German, French, Spanish, Italian, Portuguese, Dutch, Polish, Czech, Russian, Japanese, Chinese.
 */
const PHRASES: Readonly<Record<Listed, string>> = {
  time:
    'time|times|t|time stamp|timestamp|elapsed|elapsed time|clock|date|date time|datetime|zeit|zeitpunkt|zeitstempel|uhrzeit|datum|temps|heure|horodatage|instant|tiempo|hora|fecha|tempo|ora|istante|orario|data|tijd|tijdstip|czas|cas|время|дата|' +
    '時間|時刻|タイム|时间|时刻',
  sample:
    'sample|samples|sample no|sample number|sample index|index|idx|point|point no|scan|counter|count|n|i|k|no|nr|row|#|abtastwert|abtastung|messpunkt|messwert nr|nummer|echantillon|numero|mesure n|muestra|indice|campione|amostra|' +
    'monster|meetpunt|probka|numer|vzorek|cislo|отсчет|выборка|номер|№|サンプル|番号|采样点|采样序号|样本|序号|编号',
  frame: 'frame|frames|frame no|frame number|frame index|image no|image number|picture|bild|bilder|bildnummer|bild nr|einzelbild|trame|image|image n|fotograma|cuadro|imagen|fotogramma|quadro|immagine|imagem|beeld|beeldnummer|klatka|snimek|кадр|フレーム|コマ|画像番号|帧|帧号|图像编号',
  trigger:
    'trigger|trig|trigger signal|sync|synch|fire|firing|fire signal|gate|shot|shots|discharge|ausloser|auslosung|zundung|zundsignal|schuss|entladung|declencheur|declenchement|tir|decharge|disparo|disparador|descarga|scatto|innesco|tiro|scarica|' +
    'gatilho|trekker|ontsteking|schot|wyzwalacz|wyzwalanie|zaplon|strzal|spoust|vystrel|vyboj|триггер|запуск|пуск|выстрел|разряд|トリガ|トリガー|発射|放電|触发|发射|放电',
  voltage:
    'charge voltage|bank voltage|charging voltage|capacitor voltage|capacitor|voltage|volts|hv|ladespannung|kondensatorspannung|spannung|tension de charge|tension|tension de carga|voltaje|tensione di carica|tensione|tensao de carga|tensao|' +
    'laadspanning|spanning|napiecie ladowania|napiecie|nabijeci napeti|napeti|напряжение заряда|напряжение|充電電圧|電圧|充电电压|电压',
  reading:
    'displacement|position|pos|deflection|distance|reading|sensor|sensor output|signal|x|u|marker|marker x|x marker|angle|theta|laser|gap|swing|weg|auslenkung|verschiebung|abstand|winkel|ausschlag|messwert|signal|deplacement|deviation|elongation|angle|' +
    'capteur|desplazamiento|posicion|desviacion|angulo|senal|spostamento|posizione|deviazione|angolo|segnale|deslocamento|posicao|desvio|sinal|verplaatsing|positie|uitwijking|hoek|signaal|przemieszczenie|polozenie|wychylenie|kat|sygnal|' +
    'vychylka|poloha|posun|uhel|смещение|перемещение|положение|отклонение|координата|угол|сигнал|датчик|変位|位置|角度|センサ|位移|偏转|传感器|信号',
  down: 'y|v|marker y|y marker|vertical|hohe|senkrecht|verticale|vertical y|verticaal|pionowo|svisle|вертикаль|垂直|縦|纵向',
};

/** The fixed point of a camera's picture. */
const PIVOT = 'pivot|axis|hinge|bearing|fixed point|reference|drehpunkt|drehachse|achse|aufhangung|axe|charniere|pivote|eje|bisagra|perno|asse|fulcro|cerniera|eixo|dobradica|scharnier|as|os obrotu|zawias|zaves|osa|ось|шарнир|支点|回転軸|枢轴|转轴';

const NO_SPACES = /[\p{Script=Han}\p{Script=Hiragana}\p{Script=Katakana}]/u;

interface Phrases {
  readonly whole: ReadonlySet<string>;
  readonly anywhere: readonly string[];
}

function phrasesOf(list: string): Phrases {
  const words = list.split('|').map(plainWords).filter((phrase) => phrase !== '');
  return { whole: new Set(words.filter((phrase) => !NO_SPACES.test(phrase))), anywhere: words.filter((phrase) => NO_SPACES.test(phrase)) };
}

const BY_USE = (Object.entries(PHRASES) as [Listed, string][]).map(([use, list]) => ({ use, ...phrasesOf(list) }));
const PIVOTS = phrasesOf(PIVOT);

/** "x" and "no" say something in a short header alone. */
const SHORT_COVERS = 0.4;

/** Letters of the longest phrase that stands in the words; 0 for none. */
function longest({ whole, anywhere }: Phrases, words: string): number {
  let most = 0;
  const tokens = words.split(' ');
  for (let from = 0; from < tokens.length; from += 1) {
    for (let to = from + 1; to <= tokens.length; to += 1) {
      const phrase = tokens.slice(from, to).join(' ');
      if (phrase.length > most && whole.has(phrase) && (phrase.length > 2 || phrase.length >= SHORT_COVERS * words.length)) most = phrase.length;
    }
  }
  // Two signs of such a script are a word of four letters or more.
  for (const phrase of anywhere) if (words.includes(phrase)) most = Math.max(most, 2 * phrase.length);
  return most;
}

const LONGEST_HEADER = 80;

/** What a header says that its column is; the longest phrase counts, and the first of the list where two are as long. */
export function useOfHeader(header: string): SampledUse | null {
  const words = plainWords(header.slice(0, LONGEST_HEADER).replace(/(?<=\p{Ll})(?=\p{Lu})/gu, ' ').replace(/[([{][^)\]}]*[)\]}]/g, ' '));
  if (words === '') return null;
  if (longest(PIVOTS, words) > 0) return /(?:^| )(?:y|v)(?: |$)/.test(words) ? 'pivotDown' : 'pivotAcross';
  let found: SampledUse | null = null;
  let most = 0;
  for (const { use, ...phrases } of BY_USE) {
    const length = longest(phrases, words);
    if (length > most) [found, most] = [use, length];
  }
  return found;
}
