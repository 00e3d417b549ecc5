import { job } from './job.js';

const output = document.getElementById('heights');
try {
  output.textContent = JSON.stringify(job());
} catch (error) {
  output.textContent = String(error);
}
