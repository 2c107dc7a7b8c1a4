import { createRoot } from 'react-dom/client';
import { App } from './app.js';
import { followPrinting } from './draw/on-paper.js';
import { takeReadersMark } from './readers-mark.js';
import { applyTheme } from './theme.js';

takeReadersMark();
applyTheme();
followPrinting();
createRoot(document.getElementById('page')!).render(<App />);
