(function () {
"use strict";
// The player of films. A film's data are described in pack.go and player.go; places are in m
// about the spin axis, x spinward and y up at the release.
var NS = "http://www.w3.org/2000/svg";
var PHASES = ["flight", "slide", "roll", "rest"];

// reel reads the pieces of a track.
function reel(text) {
  var raw = atob(text), bytes = new Uint8Array(raw.length), i, out = [];
  for (i = 0; i < raw.length; i++) bytes[i] = raw.charCodeAt(i);
  var data = new DataView(bytes.buffer), at = 0;
  function double() { at += 8; return data.getFloat64(at - 8, true); }
  while (at < bytes.length) {
    var p = { t0: double(), t1: double(), phase: double(), turning: double() > 0, n: double(), base: [], knots: [] };
    for (i = 0; i < 6; i++) p.base.push(double());
    for (i = 0; i < 7 * p.n; i++) { p.knots.push(data.getFloat32(at, true) + (i < 7 ? 0 : p.knots[i - 7])); at += 4; }
    out.push(p);
  }
  return out;
}

// local gives place and velocity in the piece's own frame.
function local(p, t) {
  var u = t - p.t0, pos = [], vel = [], i;
  for (i = 0; i < 3; i++) { pos[i] = p.base[i] + p.base[3 + i] * u; vel[i] = p.base[3 + i]; }
  if (!p.n) return { pos: pos, vel: vel };
  var lo = 0, hi = p.n - 1;
  while (hi - lo > 1) { var mid = (lo + hi) >> 1; if (p.knots[7 * mid] >= u) hi = mid; else lo = mid; }
  var a = 7 * lo, b = 7 * Math.min(lo + 1, p.n - 1), k = p.knots, h = k[b] - k[a];
  var w = h > 0 ? Math.max(0, Math.min(1, (u - k[a]) / h)) : 0, w2 = w * w, w3 = w2 * w;
  for (i = 0; i < 3; i++) {
    var pa = k[a + 1 + i], pb = k[b + 1 + i], va = k[a + 4 + i], vb = k[b + 4 + i];
    pos[i] += (2 * w3 - 3 * w2 + 1) * pa + (3 * w2 - 2 * w3) * pb + h * ((w3 - 2 * w2 + w) * va + (w3 - w2) * vb);
    vel[i] += (3 * w2 - 4 * w + 1) * va + (3 * w2 - 2 * w) * vb + (h > 0 ? 6 * (w2 - w) * (pa - pb) / h : 0);
  }
  return { pos: pos, vel: vel };
}

function rotate(v, a) {
  var s = Math.sin(a), c = Math.cos(a);
  return [c * v[0] - s * v[1], s * v[0] + c * v[1], v[2]];
}
function angle(a, b) { return Math.atan2(a[0] * b[1] - a[1] * b[0], a[0] * b[0] + a[1] * b[1]); }
function norm(v) { return Math.sqrt(v[0] * v[0] + v[1] * v[1] + (v[2] || 0) * (v[2] || 0)); }

// rounds sums the angle gone round, in each piece's own frame, at its knots.
function rounds(film) {
  var sum = 0; // in the habitat frame
  film.pieces.forEach(function (p) {
    p.times = [p.t0];
    for (var i = 1; i < p.n; i++) p.times.push(i === p.n - 1 ? p.t1 : p.t0 + p.knots[7 * i]);
    if (!p.n) p.times.push(p.t1);
    p.places = p.times.map(function (t) { return local(p, t).pos; });
    p.round = [sum];
    for (var k = 1; k < p.times.length; k++) {
      sum += angle(p.places[k - 1], p.places[k]) - (p.turning ? 0 : film.spin * (p.times[k] - p.times[k - 1]));
      p.round.push(sum);
    }
  });
}

// state is all that is known at a moment.
function state(film, t) {
  var list = film.pieces, n = list.length, lo = 0, hi = n - 1;
  while (lo < hi) { var mid = (lo + hi) >> 1; if (list[mid].t1 >= t) hi = mid; else lo = mid + 1; }
  var p = list[t >= film.end ? n - 1 : lo];
  t = Math.max(p.t0, Math.min(p.t1, t));
  var own = local(p, t), w = film.spin, turn = w * t, s = { t: t, phase: PHASES[p.phase] }, pos, vel;
  if (p.turning) {
    s.board = own.pos; s.rel = own.vel;
    pos = rotate(own.pos, turn); vel = rotate(own.vel, turn);
    s.beyond = pos; s.vel = [vel[0] - w * pos[1], vel[1] + w * pos[0], vel[2]];
  } else {
    s.beyond = own.pos; s.vel = own.vel;
    s.board = rotate(own.pos, -turn);
    s.rel = rotate([own.vel[0] + w * own.pos[1], own.vel[1] - w * own.pos[0], own.vel[2]], -turn);
  }
  var k = p.times.length - 1;
  while (k > 0 && p.times[k] > t) k--;
  s.round = p.round[k] + angle(p.places[k], own.pos) - (p.turning ? 0 : w * (t - p.times[k]));
  s.centrifugal = [w * w * s.board[0], w * w * s.board[1], 0];
  s.coriolis = [2 * w * s.rel[1], -2 * w * s.rel[0], 0];
  s.apparent = [s.centrifugal[0] + s.coriolis[0], s.centrifugal[1] + s.coriolis[1], 0];
  if (film.flat) {
    s.offset = film.radius * (Math.tan(film.lean + s.round) - Math.tan(film.lean));
    s.height = film.radius + s.board[1];
  } else {
    s.offset = film.radius * s.round;
    s.height = film.radius - Math.sqrt(s.board[0] * s.board[0] + s.board[1] * s.board[1]);
  }
  s.axial = s.board[2] - film.axial;
  return s;
}

// uniform is the place on the uniform-gravity path.
function uniform(film, t) {
  var u = film.uniform, at = Math.min(t, u.time), along = u.along * at, h = u.height + u.up * at - u.g * at * at / 2, a;
  if (!film.flat) {
    a = along / film.radius;
    return [(film.radius - h) * Math.sin(a), -(film.radius - h) * Math.cos(a)];
  }
  var s = Math.sin(film.lean), c = Math.cos(film.lean), foot = film.radius / c;
  return [foot * s + c * along - s * h, -foot * c + s * along + c * h];
}

// signif prints a number to n digits, as words.go does.
function signif(v, n) {
  if (v === 0) return "0";
  var s = v.toExponential(n - 1), e = +s.slice(s.indexOf("e") + 1);
  s = e < -4 || e > 6 ? s.replace("e+", "e") : v.toFixed(Math.max(0, n - 1 - e));
  return s.replace(/-/g, "\u2212");
}
function length(v, n) {
  var a = Math.abs(v);
  if (a === 0 || a >= 0.1 && a < 9999.5) return signif(v, n) + " m";
  if (a < 1e-7) return "0 m";
  if (a < 1e-4) return signif(v * 1e6, n) + " \u00b5m";
  if (a < 0.1) return signif(v * 1e3, n) + " mm";
  return signif(v / 1e3, n) + " km";
}
function way(v) {
  var s = length(Math.abs(v), 4);
  return s === "0 m" ? s : s + (v > 0 ? " spinward" : " antispinward");
}
function speed(v) { return (Math.abs(v) < 1e-7 ? "0" : signif(v, 4)) + " m/s"; }
function accel(v) { return (Math.abs(v) < 1e-7 ? "0" : signif(v, 4)) + " m/s\u00b2"; }
function seconds(t, end) { return t.toFixed(end >= 1000 ? 1 : end >= 100 ? 2 : end >= 1 ? 3 : 4) + " s"; }
function nice(v) {
  var p = Math.pow(10, Math.floor(Math.log10(v)));
  return v >= 5 * p ? 5 * p : v >= 2 * p ? 2 * p : p;
}
function put(v) { return Math.round(v * 100) / 100; }
function make(name, cls, into) {
  var e = document.createElementNS(NS, name);
  if (cls) e.setAttribute("class", cls);
  into.appendChild(e);
  return e;
}

// Drawing is one of the two frames.
function Drawing(film, svg, spec, key) {
  this.film = film; this.svg = svg; this.spec = spec; this.key = key;
  this.trails = PHASES.map(function (name) { return svg.querySelector(".f-trail.f-" + name); });
  this.ahead = svg.querySelector(".f-ahead");
  this.body = svg.querySelector(".f-body");
  this.turn = svg.querySelector(".f-turn");
  this.marks = [1, 2, 3].map(function (k) { return Array.prototype.slice.call(svg.querySelectorAll(".f-mark-" + k)); });
  this.arrows = {};
  this.legends = make("g", "f-legends", svg);
}
Drawing.prototype.at = function (p) {
  return [this.spec[3] + (p[0] - this.spec[1]) * this.spec[0], this.spec[4] - (p[1] - this.spec[2]) * this.spec[0]];
};
// prepare lays the path out once: points further apart than half a unit.
Drawing.prototype.prepare = function (spots) {
  var self = this, last = null;
  this.points = [];
  spots.forEach(function (s, i) {
    var q = self.at(s[self.key]), joint = i === spots.length - 1 || spots[i + 1].phase !== s.phase || s.joint;
    if (last && !joint && Math.abs(q[0] - last[0]) + Math.abs(q[1] - last[1]) < 0.7) return;
    self.points.push({ t: s.t, phase: PHASES.indexOf(s.phase), x: put(q[0]), y: put(q[1]) });
    last = q;
  });
  var d = "";
  this.points.forEach(function (p, i) { d += (i ? "L" : "M") + p.x + " " + p.y; });
  this.ahead.setAttribute("d", d);
};
Drawing.prototype.trail = function (s, xy) {
  var d = ["", "", "", ""], list = this.points, i, on = -1;
  for (i = 1; i < list.length && list[i].t <= s.t; i++) {
    var p = list[i];
    if (p.phase !== on) { on = p.phase; d[on] += "M" + list[i - 1].x + " " + list[i - 1].y; }
    d[on] += "L" + p.x + " " + p.y;
  }
  var now = PHASES.indexOf(s.phase);
  if (now !== on) d[now] += "M" + list[i - 1].x + " " + list[i - 1].y;
  d[now] += "L" + put(xy[0]) + " " + put(xy[1]);
  this.trails.forEach(function (e, k) { e.setAttribute("d", d[k]); });
};
// turned is the transformation that turns the drawing about the axis.
Drawing.prototype.turned = function (a) {
  var c = this.at([0, 0]), s = Math.sin(a), h = Math.sin(a / 2), less = 2 * h * h;
  return "matrix(" + [Math.cos(a), -s, s, Math.cos(a), c[0] * less - s * c[1], c[1] * less + s * c[0]].join(" ") + ")";
};
Drawing.prototype.arrow = function (name, xy, v, perUnit, on) {
  var e = this.arrows[name];
  if (!e) e = this.arrows[name] = make("path", "f-arrow f-arrow-" + name, this.body.parentNode.insertBefore(document.createElementNS(NS, "g"), this.body));
  var dx = v[0] * perUnit, dy = -v[1] * perUnit, l = Math.sqrt(dx * dx + dy * dy);
  if (!on || !(l > 1.5)) { e.setAttribute("d", ""); return; }
  var ux = dx / l, uy = dy / l, h = Math.min(8, l * 0.6), x = xy[0] + dx, y = xy[1] + dy;
  e.setAttribute("d", "M" + [put(xy[0]), put(xy[1])].join(" ") + "L" + [put(x), put(y)].join(" ") +
    "M" + [put(x - ux * h - uy * h * 0.42), put(y - uy * h + ux * h * 0.42)].join(" ") + "L" + [put(x), put(y)].join(" ") +
    "L" + [put(x - ux * h + uy * h * 0.42), put(y - uy * h - ux * h * 0.42)].join(" "));
};
// legend states the scale of arrows: a bar of a round value.
Drawing.prototype.legend = function (rows) {
  var g = this.legends;
  while (g.firstChild) g.removeChild(g.firstChild);
  rows.forEach(function (r, i) {
    var value = nice(58 / r.perUnit), w = value * r.perUnit, y = 18 + 16 * i;
    make("path", "f-arrow f-arrow-" + r.name, g).setAttribute("d", "M12 " + y + "h" + put(w) + "m-7 -3l7 3l-7 3");
    var t = make("text", "f-label", g);
    t.setAttribute("x", 12 + w + 8); t.setAttribute("y", y + 4);
    t.textContent = r.words + ", bar: " + String(value).replace(/e\+/, "e") + " " + r.unit;
  });
};

function Player(root) {
  var film = JSON.parse(root.getAttribute("data-film"));
  film.pieces = reel(film.reel);
  rounds(film);
  this.root = root; this.film = film; this.t = 0; this.playing = false; this.rate = film.rate;
  this.find = function (c) { return root.querySelector(".film-" + c); };
  this.board = new Drawing(film, this.find("board"), film.board, "board");
  this.beyond = new Drawing(film, this.find("beyond"), film.beyond, "beyond");
  this.ghost = root.querySelector(".f-ghost");
  this.curve = root.querySelector(".f-uniform");
  var spots = this.spots();
  this.board.prepare(spots); this.beyond.prepare(spots);
  this.scales(spots);
  this.strip = this.find("strip");
  this.thumb = root.querySelector(".f-thumb");
  this.gone = root.querySelector(".f-gone");
  this.controls();
  this.seek(0);
}
Player.prototype.spots = function () {
  var film = this.film, out = [state(film, 0)];
  var points = Math.min(6000, Math.max(700, 60 * Math.abs(film.spin) * film.end / 6.283));
  film.pieces.forEach(function (p) {
    if (p.t1 <= p.t0) return;
    var n = 12 + Math.floor(points * (p.t1 - p.t0) / film.end);
    for (var k = 1; k <= n; k++) {
      var s = state(film, k === n ? p.t1 : p.t0 + (p.t1 - p.t0) * k / n);
      s.phase = PHASES[p.phase]; s.joint = k === n;
      out.push(s);
    }
  });
  return out;
};
// scales of the arrows: the longest of each kind is about a fifth of the drawing.
Player.prototype.scales = function (spots) {
  var rel = 0, vel = 0, acc = 0, longest = 84;
  spots.forEach(function (s) {
    rel = Math.max(rel, norm([s.rel[0], s.rel[1]])); vel = Math.max(vel, norm([s.vel[0], s.vel[1]]));
    acc = Math.max(acc, norm(s.centrifugal), norm(s.coriolis));
  });
  this.perRel = longest / Math.max(rel, 1e-9); this.perVel = longest / Math.max(vel, 1e-9); this.perAcc = longest / Math.max(acc, 1e-9);
};
Player.prototype.on = function (name) { var e = this.find(name); return !!e && e.checked; };
Player.prototype.seek = function (t) {
  this.t = Math.max(0, Math.min(this.film.end, t));
  this.draw();
};
Player.prototype.draw = function () {
  var film = this.film, s = state(film, this.t), b = this.board.at(s.board), o = this.beyond.at(s.beyond), self = this;
  var trail = this.on("trail");
  [[this.board, b], [this.beyond, o]].forEach(function (x) {
    var d = x[0], xy = x[1];
    d.body.setAttribute("transform", "translate(" + put(xy[0]) + " " + put(xy[1]) + ")");
    if (trail) d.trail(s, xy);
    d.trails.forEach(function (e) { e.setAttribute("visibility", trail ? "visible" : "hidden"); });
    d.ahead.setAttribute("visibility", self.on("path") ? "visible" : "hidden");
    d.marks.forEach(function (list, k) {
      list.forEach(function (e) { e.setAttribute("visibility", self.t >= film.marks[k] ? "visible" : "hidden"); });
    });
  });
  this.beyond.turn.setAttribute("transform", this.beyond.turned(film.spin * s.t));
  if (this.ghost) {
    var g = this.board.at(uniform(film, this.t)), shown = this.on("uniform") ? "visible" : "hidden";
    this.ghost.setAttribute("transform", "translate(" + put(g[0]) + " " + put(g[1]) + ")");
    this.ghost.setAttribute("visibility", shown);
    this.curve.setAttribute("visibility", shown);
  }
  var vel = this.on("velocity"), acc = this.on("apparent");
  this.board.arrow("velocity", b, s.rel, this.perRel, vel);
  this.board.arrow("centrifugal", b, s.centrifugal, this.perAcc, acc);
  this.board.arrow("coriolis", b, s.coriolis, this.perAcc, acc);
  this.beyond.arrow("velocity", o, s.vel, this.perVel, vel);
  this.numbers(s, b, o);
  var part = film.end > 0 ? this.t / film.end : 0, at = film.strip[0] + (film.strip[1] - film.strip[0]) * part;
  this.thumb.setAttribute("cx", at + "%");
  this.gone.setAttribute("x2", at + "%");
};
Player.prototype.numbers = function (s, b, o) {
  var film = this.film, self = this, root = this.root;
  function set(name, words) { var e = self.find("n-" + name); if (e && e.textContent !== words) e.textContent = words; }
  set("time", seconds(this.t, film.end));
  set("phase", s.phase);
  set("offset", way(s.offset));
  set("height", length(s.height, 4));
  set("axial", length(s.axial, 4));
  set("speed", speed(norm(s.rel)));
  set("inertial", speed(norm(s.vel)));
  set("accel", accel(norm(s.apparent)));
  set("centrifugal", "centrifugal " + accel(norm(s.centrifugal)));
  set("coriolis", "Coriolis " + accel(norm(s.coriolis)));
  root.setAttribute("data-time", this.t);
  root.setAttribute("data-phase", s.phase);
  root.setAttribute("data-habitat", s.board.join(" "));
  root.setAttribute("data-inertial", s.beyond.join(" "));
  root.setAttribute("data-offset", s.offset);
  root.setAttribute("data-height", s.height);
  root.setAttribute("data-speed", norm(s.rel));
  root.setAttribute("data-inertial-speed", norm(s.vel));
  root.setAttribute("data-centrifugal", norm(s.centrifugal));
  root.setAttribute("data-coriolis", norm(s.coriolis));
  root.setAttribute("data-drawn", [put(b[0]), put(b[1]), put(o[0]), put(o[1])].join(" "));
  this.strip.setAttribute("aria-valuenow", +this.t.toFixed(4));
  // While it plays a screen reader is left in peace: it hears the place when it stops.
  if (!this.playing) {
    this.strip.setAttribute("aria-valuetext", seconds(this.t, film.end) + ", " + s.phase + ", offset " + way(s.offset) + ", height " + length(s.height, 4));
  }
};
Player.prototype.stop = function () {
  if (!this.playing) return;
  this.playing = false;
  this.label();
  this.draw();
};
Player.prototype.label = function () {
  var e = this.find("play");
  e.querySelector("span").textContent = this.playing ? "Pause" : "Play";
  e.classList.toggle("film-on", this.playing);
};
Player.prototype.play = function () {
  if (this.playing) return this.stop();
  var self = this, last = null;
  if (this.t >= this.film.end) this.seek(0);
  this.playing = true;
  this.label();
  function frame(now) {
    if (!self.playing) return;
    // A page that was hidden goes on where it stopped.
    if (last !== null) self.seek(self.t + Math.min(0.25, (now - last) / 1000) * self.rate);
    last = now;
    if (self.t >= self.film.end) self.stop(); else requestAnimationFrame(frame);
  }
  requestAnimationFrame(frame);
};
// step goes to the next multiple of the output step, or to an event that comes first.
Player.prototype.step = function (sign, many) {
  var film = this.film, h = film.step * (many || 1), eps = film.step * 1e-6;
  var k = sign > 0 ? Math.floor(this.t / h + 1e-6) + 1 : Math.ceil(this.t / h - 1e-6) - 1, to = k * h, t = this.t;
  if (film.events.length < 400) film.events.forEach(function (e) {
    if (sign > 0 && e > t + eps && e < to || sign < 0 && e < t - eps && e > to) to = e;
  });
  this.stop();
  this.seek(to);
};
Player.prototype.jump = function (sign) {
  var t = this.t, eps = this.film.step * 1e-6, to = sign > 0 ? this.film.end : 0;
  this.film.events.forEach(function (e) {
    if (sign > 0 && e > t + eps && e < to || sign < 0 && e < t - eps && e > to) to = e;
  });
  this.stop();
  this.seek(to);
};
Player.prototype.controls = function () {
  var self = this, root = this.root;
  this.find("play").addEventListener("click", function () { self.play(); });
  this.find("back").addEventListener("click", function () { self.step(-1); });
  this.find("forth").addEventListener("click", function () { self.step(1); });
  this.find("speed").addEventListener("change", function () { self.rate = +this.value; });
  Array.prototype.forEach.call(root.querySelectorAll(".film-jump"), function (e) {
    e.addEventListener("click", function () { self.stop(); self.seek(+e.getAttribute("data-t")); });
  });
  Array.prototype.forEach.call(root.querySelectorAll("input[type=checkbox]"), function (e) {
    e.addEventListener("change", function () { self.legends(); self.draw(); });
  });
  var strip = this.strip, held = false;
  function drag(ev) {
    var box = strip.getBoundingClientRect(), f = self.film;
    var x0 = box.left + box.width * f.strip[0] / 100, w = box.width * (f.strip[1] - f.strip[0]) / 100;
    var t = Math.max(0, Math.min(f.end, (ev.clientX - x0) / w * f.end)), near = 6 / w * f.end, best = t;
    // Within six pixels of an event it is the event that is meant.
    f.marks.concat(f.end).forEach(function (e) { if (e !== null && e <= f.end && Math.abs(e - t) < near) { near = Math.abs(e - t); best = e; } });
    self.seek(best);
  }
  strip.addEventListener("pointerdown", function (ev) {
    if (ev.button) return;
    held = true; self.stop(); strip.focus({ preventScroll: true });
    try { strip.setPointerCapture(ev.pointerId); } catch (e) { /* a pointer that is no longer there */ }
    drag(ev); ev.preventDefault();
  });
  strip.addEventListener("pointermove", function (ev) { if (held) drag(ev); });
  ["pointerup", "pointercancel"].forEach(function (n) { strip.addEventListener(n, function () { held = false; }); });
  strip.addEventListener("keydown", function (ev) {
    if (ev.ctrlKey || ev.altKey || ev.metaKey) return;
    var many = ev.shiftKey ? 10 : 1;
    switch (ev.key) {
    case "ArrowRight": case "ArrowUp": self.step(1, many); break;
    case "ArrowLeft": case "ArrowDown": self.step(-1, many); break;
    case "PageUp": self.jump(1); break;
    case "PageDown": self.jump(-1); break;
    case "Home": self.stop(); self.seek(0); break;
    case "End": self.stop(); self.seek(self.film.end); break;
    case " ": case "Enter": self.play(); break;
    default: return;
    }
    ev.preventDefault();
  });
  this.legends();
};
Player.prototype.legends = function () {
  var vel = this.on("velocity"), acc = this.on("apparent"), rows = [];
  if (vel) rows.push({ name: "velocity", words: "velocity in the habitat", unit: "m/s", perUnit: this.perRel });
  if (acc) {
    rows.push({ name: "centrifugal", words: "centrifugal", unit: "m/s\u00b2", perUnit: this.perAcc });
    rows.push({ name: "coriolis", words: "Coriolis", unit: "m/s\u00b2", perUnit: this.perAcc });
  }
  this.board.legend(rows);
  this.beyond.legend(vel ? [{ name: "velocity", words: "inertial velocity", unit: "m/s", perUnit: this.perVel }] : []);
};

// begin makes the player of a film, once.
function begin(root) {
  if (!root.filmPlayer) root.filmPlayer = new Player(root);
  return root.filmPlayer;
}

// ready shows the controls of a film, which take their room from the start, and answers what
// is asked of it, even before its player is made.
function ready(root) {
  if (root.filmReady) return false;
  root.filmReady = true;
  Array.prototype.forEach.call(root.querySelectorAll("[data-film-live]"), function (e) { e.hidden = false; });
  Array.prototype.forEach.call(root.querySelectorAll("[data-film-still]"), function (e) { e.hidden = true; });
  root.addEventListener("film-seek", function () { var p = begin(root); p.stop(); p.seek(+root.getAttribute("data-seek")); });
  ["focusin", "pointerdown"].forEach(function (n) { root.addEventListener(n, function () { begin(root); }, true); });
  return true;
}

// A page of more films than AT_ONCE makes their players when they come near the screen, so
// that it opens as fast as one of few.
var AT_ONCE = 12;

function start() {
  var all = Array.prototype.filter.call(document.querySelectorAll("[data-film]"), ready);
  if (all.length <= AT_ONCE || !window.IntersectionObserver) { all.forEach(begin); return; }
  var near = new IntersectionObserver(function (list) {
    list.forEach(function (e) { if (e.isIntersecting) { near.unobserve(e.target); begin(e.target); } });
  }, { rootMargin: "600px 0px" });
  all.forEach(function (root) { near.observe(root); });
}
if (document.readyState === "loading") document.addEventListener("DOMContentLoaded", start); else start();
}());
