// A script of its own, so that the page's text is there before the figure library is even parsed. It sets window.Plotly.
import 'plotly.js-basic-dist-min';
