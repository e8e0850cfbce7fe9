import '@fontsource/inter/400.css';
import '@fontsource/inter/500.css';
import '@fontsource/inter/600.css';
import './styles.css';
import { start } from './app/app';

const root = document.querySelector('#root');
if (root) start(root);
