import sharp from 'sharp';

/**
 * An invented plan of a table from above, drawn by code: turntable, table, EUT in its middle, its leads and where they
 * leave, and the antenna at the right. No photograph of anything.
 */
export async function drawPlan(): Promise<Uint8Array> {
  const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="1600" height="1000" viewBox="0 0 1600 1000">
    <rect width="1600" height="1000" fill="#e5e6db"/>
    <g fill="none" stroke="#aeb5a4" stroke-width="2">
      ${Array.from({ length: 16 }, (_, i) => `<path d="M${i * 100} 0V1000M0 ${i * 100}H1600"/>`).join('')}
    </g>
    <circle cx="520" cy="500" r="400" fill="#f1f3e8" stroke="#16211e" stroke-width="6"/>
    <rect x="220" y="340" width="600" height="320" fill="#d9c9a6" stroke="#16211e" stroke-width="6"/>
    <g fill="none" stroke="#27508f" stroke-width="10" stroke-linecap="round">
      <path d="M420 500C330 500 320 420 270 430S230 560 260 600V760"/>
      <path d="M620 470c60-40 80 60 140 20s-20-100-60-80"/>
    </g>
    <rect x="420" y="430" width="200" height="140" fill="#f9f9f3" stroke="#16211e" stroke-width="8"/>
    <rect x="236" y="760" width="48" height="48" fill="#16211e"/>
    <g stroke="#43504b" stroke-width="6" stroke-dasharray="18 14"><path d="M620 500H1380"/></g>
    <g stroke="#16211e" stroke-width="10">
      <path d="M1380 500H1540"/>
      ${[120, 96, 74, 54, 36].map((half, i) => `<path d="M${1500 - i * 28} ${500 - half}V${500 + half}"/>`).join('')}
    </g>
  </svg>`;
  return sharp(Buffer.from(svg)).png().toBuffer();
}
