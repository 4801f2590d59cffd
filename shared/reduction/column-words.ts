/** How strongly a word in a header speaks for a role, and words that speak against it. From common practice, no source. */
export interface RoleWords {
  readonly strong: readonly (readonly [RegExp, number])[];
  readonly against: RegExp;
}

/** Makes a header comparable: camel case split, accents off, marks to spaces, lower case. */
export const plainWords = (header: string): string =>
  header
    .replace(/([a-z])([A-Z])/g, '$1 $2')
    .normalize('NFD')
    .replace(/\p{M}/gu, '')
    .toLowerCase()
    .replace(/[^\p{L}\p{N}%#δ°]+/gu, ' ')
    .trim();

const NEVER =
  /\b(limit|setpoint|set point|target|soll|min|max|minimum|maximum|avg|average|mean|margin|distance|throttl\w*|offset|alarm|warning|critical|peak)\b/;

export const HEAT_SOURCE: RoleWords = {
  strong: [
    [/\bheat ?source|heatsource|\bheater|\bheat\b|\bheizer|source chaude\b/, 10],
    [
      /\bplate\b|\bdie\b|\bpackage\b|\bcase\b|\btcase\b|\bt ?case\b|\bcold ?plate|\bbase ?plate|\bihs\b|\bdut\b|\bjunction\b|\btj\b/,
      8,
    ],
    [
      /\bcpu\b|\bgpu\b|\bchip\b|\bprocessor\b|\bprozessor\b|\bblock\b|\bsource\b|\bquelle\b|\bload (temp|cell)\w*/,
      6,
    ],
    [/\bcore\b|\bhot ?spot\b|\bhot\b|\bbase\b|\bsink\b/, 4],
    [/\btemp\w*\b|\bt ?\d*\b|\btc ?\d*\b|\bprobe\b|\bsensor\b|\bchannel\b|\bch ?\d+\b|\bthermocouple\b/, 1],
  ],
  against:
    /\b(ambient|amb|room|air|inlet|intake|outlet|exhaust|umgebung\w*|raum\w*|vrm|ssd|hdd|drive|motherboard|mainboard|memory|dimm|chipset|pch|psu|delta|rise|dt|δt|water|coolant|liquid|power|watts?|heat load|current|voltage|vid|fan|rpm|speed|usage|duty|clock|utili[sz]ation|leistung|puissance)\b|δ/,
};

export const AMBIENT: RoleWords = {
  strong: [
    [/\bambient\w*|\bamb\b|\btamb\b|\bumgebung\w*|\bambiante?\b|\bambiente\b/, 10],
    [/\broom\b|\braum\w*|\bsurround\w*|\blab\b|\benvironment\b|\bchamber\b|\bpiece\b/, 8],
    [/\binlet\b|\bintake\b|\bair in\b|\binlet air\b|\bair temp\w*|\bair\b|\bluft\b|\bzuluft\b/, 6],
    [/\btemp\w*\b|\bt ?\d*\b|\btc ?\d*\b|\bprobe\b|\bsensor\b|\bchannel\b|\bch ?\d+\b|\bthermocouple\b/, 1],
  ],
  against:
    /\b(cpu|gpu|core|package|die|plate|heater|source|outlet|exhaust|vrm|ssd|hdd|drive|water|coolant|rise|delta|dt|δt)\b|δ/,
};

export const WATTS: RoleWords = {
  strong: [
    [/\bheat ?load\b|\bheat(er)? power\b|\bheating power\b|\bheizleistung\b/, 10],
    [/\bpackage\b|\bheater\b|\bheat\b|\bdissipat\w*|\bsource\b/, 8],
    [/\bcpu\b|\bgpu\b|\btotal\b/, 6],
    [/\bpower\b|\bwatts?\b|\bleistung\b|\bpuissance\b|\bpotencia\b|\bload\b|\bp\b/, 5],
  ],
  against: /\b(fan|pump|vrm|soc|memory|dram|uncore|wall|socket|psu)\b/,
};

export const FAN_SPEED: RoleWords = {
  strong: [
    [/\bcooler fan\b|\bfan speed\b|\bcpu fan\b|\blufterdrehzahl\b/, 10],
    [/\bfan\b|\bfan ?1\b|\blufter\w*|\bventilateur\b|\bventilador\b/, 8],
    [/\brpm\b|\bdrehzahl\b|\btach\w*\b|\bspeed\b|\bn\b/, 5],
  ],
  against: /\b(pump|chassis|case fan|sys|duty|pwm|gpu)\b|%/,
};

export const TIME: RoleWords = {
  strong: [
    [/\belapsed\b|\bverstrichen\b|\becoule\b/, 10],
    [
      /\btime ?stamp\b|\bdate ?time\b|\btime\b|\bzeit\w*|\buhrzeit\b|\btemps\b|\bheure\b|\bhora\b|\btiempo\b|\btempo\b/,
      8,
    ],
    [/\bseconds?\b|\bsecs?\b|\bminutes?\b|\bsekunden\b|\bdate\b|\bdatum\b|\bclock\b|\bfecha\b/, 6],
    [/^t$|^t s$/, 5],
  ],
  against: /\b(uptime|response|latency|boot|period|interval|dauer)\b/,
};

/** Whether the words of a header, made comparable, rule a role out. */
export const speaksAgainst = (words: string, role: RoleWords): boolean =>
  role.against.test(words) || NEVER.test(words);

/** Weight of a header's words for a role, 0 when they say nothing or speak against it. */
export const wordScore = (words: string, role: RoleWords): number =>
  speaksAgainst(words, role) ? 0 : (role.strong.find(([pattern]) => pattern.test(words))?.[1] ?? 0);
