import type { PlotlyLibrary } from './plotly-types';

declare global {
  interface Window {
    Plotly?: PlotlyLibrary;
  }
}

// The nonce can be read only while the page's own script runs.
const nonce = document.currentScript?.nonce ?? '';
let loading: Promise<PlotlyLibrary> | undefined;

/**
 * The figure library, loaded on first use and only after the text has been painted: it is a megabyte of script, and the
 * numbers must not wait for it.
 */
export function figureLibrary(): Promise<PlotlyLibrary> {
  loading ??= new Promise((resolve, reject) => {
    const load = (): void => {
      const script = document.createElement('script');
      script.nonce = nonce;
      script.src = document.body.dataset['figureLibrary'] ?? '';
      script.onload = () => {
        if (window.Plotly) resolve(window.Plotly);
        else reject(new Error('the figure library loaded but is not there'));
      };
      script.onerror = () => reject(new Error('the figure library could not be loaded'));
      document.head.append(script);
    };
    // Two frames: the first lays the text out, the second comes after it has been painted.
    requestAnimationFrame(() => requestAnimationFrame(load));
  });
  return loading;
}
