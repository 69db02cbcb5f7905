export type CurveTone = 'petrol' | 'plum' | 'ochre' | 'ink';

export interface ChartColours {
  petrol: string;
  plum: string;
  ochre: string;
  ink: string;
  soft: string;
  hair: string;
  sheet: string;
  paper: string;
  petrolWash: string;
}

/** A canvas can't read CSS variables: resolve the tokens through a probe element in the chart's own place. */
export function resolveColours(host: HTMLElement): ChartColours {
  const probe = document.createElement('span');
  probe.hidden = true;
  host.append(probe);
  const read = (token: string) => {
    probe.style.color = `var(--${token})`;
    return getComputedStyle(probe).color;
  };
  const colours = {
    petrol: read('petrol'),
    plum: read('plum'),
    ochre: read('ochre'),
    ink: read('ink'),
    soft: read('soft'),
    hair: read('hair'),
    sheet: read('sheet'),
    paper: read('paper'),
    petrolWash: read('petrol-wash'),
  };
  probe.remove();
  return colours;
}
