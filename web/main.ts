/** Entry of the page: defines its elements. */
import './welcome.ts';
