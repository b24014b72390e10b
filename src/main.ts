import '@fontsource/noto-sans/400.css';
import '@fontsource/noto-sans/600.css';
import '@fontsource/noto-sans-math/latin-400.css';
import 'quasar/src/css/index.sass';
import './css/tokens.scss';
import './css/base.scss';
import './css/overrides.scss';
import { createPinia } from 'pinia';
import { Quasar } from 'quasar';
import { createApp } from 'vue';
import App from './App.vue';
import { makeRouter } from './router/index.js';

createApp(App)
  .use(createPinia())
  .use(makeRouter())
  .use(Quasar, { config: { ripple: false } })
  .mount('#app');
