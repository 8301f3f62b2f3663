import { useEffect, useState } from 'react';

/** Code 128 of a bare number, as a drawing; the library is loaded only where a paper is shown. */
export function Barcode({ text, height = 40 }: { text: string; height?: number }) {
  const [svg, setSvg] = useState('');
  useEffect(() => {
    let isOpen = true;
    void import('bwip-js/browser').then(({ default: bwip }) => {
      if (isOpen)
        setSvg(
          bwip.toSVG({ bcid: 'code128', text, height: 10, includetext: false, paddingwidth: 0 }),
        );
    });
    return () => {
      isOpen = false;
    };
  }, [text]);
  return (
    <img
      alt={`Bar code ${text}`}
      height={height}
      style={{ height, maxWidth: '100%' }}
      src={svg ? `data:image/svg+xml;utf8,${encodeURIComponent(svg)}` : undefined}
    />
  );
}
