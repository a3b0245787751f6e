import { render } from 'preact';
import type { FromLookPage, ToLookPage } from '../src/core/protocol/panel';
import './style/page.css';
import { LookPage } from './look/look-page';
import { connectHost } from './page/host';

const host = connectHost<ToLookPage, FromLookPage>();
const root = document.getElementById('page');
if (root) render(<LookPage host={host} />, root);
