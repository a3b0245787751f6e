import { render } from 'preact';
import type { FromDataPage, ToDataPage } from '../src/core/protocol/panel';
import './style/page.css';
import { DataPage } from './data/data-page';
import { connectHost } from './page/host';

const host = connectHost<ToDataPage, FromDataPage>();
const root = document.getElementById('page');
if (root) render(<DataPage host={host} />, root);
