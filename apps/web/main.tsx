import { createRoot } from 'react-dom/client';
import { App } from './app.js';
import { takeReadersMark } from './readers-mark.js';
import { applyTheme } from './theme.js';

takeReadersMark();
applyTheme();
createRoot(document.getElementById('page')!).render(<App />);
