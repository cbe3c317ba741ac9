/** Money in English words, as it stands under the price: "thirty-eight thousand five hundred euro". */
const UNITS = [
  "zero",
  "one",
  "two",
  "three",
  "four",
  "five",
  "six",
  "seven",
  "eight",
  "nine",
  "ten",
  "eleven",
  "twelve",
  "thirteen",
  "fourteen",
  "fifteen",
  "sixteen",
  "seventeen",
  "eighteen",
  "nineteen",
];
const TENS = ["", "", "twenty", "thirty", "forty", "fifty", "sixty", "seventy", "eighty", "ninety"];
const SCALES: readonly (readonly [number, string])[] = [
  [1e12, "trillion"],
  [1e9, "billion"],
  [1e6, "million"],
  [1e3, "thousand"],
];

/** One and many, by ISO 4217; a currency that is not here is named by its code. */
const CURRENCIES: Readonly<Record<string, readonly [string, string]>> = {
  AUD: ["Australian dollar", "Australian dollars"],
  BRL: ["Brazilian real", "Brazilian reais"],
  CAD: ["Canadian dollar", "Canadian dollars"],
  CHF: ["Swiss franc", "Swiss francs"],
  CNY: ["yuan", "yuan"],
  CZK: ["Czech koruna", "Czech koruna"],
  DKK: ["Danish krone", "Danish kroner"],
  EUR: ["euro", "euro"],
  GBP: ["pound sterling", "pounds sterling"],
  HUF: ["forint", "forint"],
  INR: ["rupee", "rupees"],
  JPY: ["yen", "yen"],
  MXN: ["Mexican peso", "Mexican pesos"],
  NOK: ["Norwegian krone", "Norwegian kroner"],
  NZD: ["New Zealand dollar", "New Zealand dollars"],
  PLN: ["zloty", "zloty"],
  SEK: ["Swedish krona", "Swedish kronor"],
  USD: ["US dollar", "US dollars"],
  ZAR: ["rand", "rand"],
};

function underThousand(number: number): string {
  if (number < 20) return UNITS[number]!;
  if (number < 100) {
    const rest = number % 10;
    return rest === 0 ? TENS[number / 10]! : `${TENS[Math.floor(number / 10)]}-${UNITS[rest]}`;
  }
  const rest = number % 100;
  const hundreds = `${UNITS[Math.floor(number / 100)]} hundred`;
  return rest === 0 ? hundreds : `${hundreds} and ${underThousand(rest)}`;
}

/** A whole number below 10^15 in words; "minus …" below zero. Larger ones come back as figures. */
export function numberInWords(number: number): string {
  const whole = Math.round(number);
  if (!Number.isFinite(number) || Math.abs(whole) >= 1e15) return String(number);
  if (whole < 0) return `minus ${numberInWords(-whole)}`;
  const words: string[] = [];
  let rest = whole;
  for (const [size, name] of SCALES) {
    const count = Math.floor(rest / size);
    if (count > 0) words.push(`${underThousand(count)} ${name}`);
    rest %= size;
  }
  if (rest > 0 || words.length === 0)
    words.push(rest < 100 && words.length > 0 ? `and ${underThousand(rest)}` : underThousand(rest));
  return words.join(" ");
}

/** Whole money in words with its currency's name. */
export function amountInWords(amount: number, currencyCode: string): string {
  const [one, many] = CURRENCIES[currencyCode] ?? [currencyCode, currencyCode];
  return `${numberInWords(amount)} ${Math.abs(Math.round(amount)) === 1 ? one : many}`;
}
