/* The two kernels of the speed table in C: the equations of the signal path for a sine sweep under the law of time, in double precision, sample
 * by sample in one loop, with the engine's line (written once, never wrapped, moved back at its end) and update interval. Parameters are read at
 * run time, as the engine reads them. Not used by the project: only to have a ratio.
 *
 * stereo: two lines, any number of voices read by the third-order Lagrange filter, linear loop with damping and low cut.
 * mono:   one line, one voice and the loop read linearly.
 * passes: as stereo, but cut into the passes that the engine makes (loop, then voice after voice, then mix), which gcc can vectorise.
 *
 * "kernels KIND FRAMES FILE" reads FRAMES doubles a channel from FILE, then per line on standard input runs them once from silence and prints
 * the nanoseconds it took; the line "dump" makes it write the output as raw doubles instead.
 */
#include <math.h>
#include <stdio.h>
#include <stdlib.h>
#include <string.h>
#include <time.h>

#define MAX_VOICES 8
#define PI 3.14159265358979323846

typedef struct {
    double fs, base_ms, depth_ms, rate_hz, spread_ms, phase_spread, stereo_phase;
    double feedback, damping, low_cut, dry, wet;
    int voices, every, channels, passes;
} settings;

typedef struct {
    double *line[2];
    long length, size, position, n;
    double from[2][MAX_VOICES], to[2][MAX_VOICES], loop_from[2], loop_to[2];
    double low[2], before[2], high[2];
} state;

static void evaluate(const settings *s, long n, double delay[2][MAX_VOICES], double loop[2])
{
    for (int c = 0; c < s->channels; c++) {
        for (int v = 0; v < s->voices; v++) {
            double phase = n * s->rate_hz / s->fs + v * s->phase_spread / (360 * s->voices) + c * s->stereo_phase / 360;
            double shape = sin(2 * PI * (phase - floor(phase)));
            double offset = s->voices > 1 ? s->spread_ms * ((double)v / (s->voices - 1) - 0.5) : 0;
            delay[c][v] = (s->base_ms + offset + s->depth_ms * shape) * s->fs / 1000;
            if (v == 0) loop[c] = (s->base_ms + s->depth_ms * shape) * s->fs / 1000;
        }
    }
}

static void enter(const settings *s, state *st)
{
    if (st->n == 0) {
        evaluate(s, 0, st->from, st->loop_from);
    } else {
        memcpy(st->from, st->to, sizeof st->from);
        memcpy(st->loop_from, st->loop_to, sizeof st->loop_from);
    }
    evaluate(s, st->n + s->every, st->to, st->loop_to);
}

static void rewind_lines(const settings *s, state *st)
{
    for (int c = 0; c < s->channels; c++) memmove(st->line[c], st->line[c] + st->size - st->length, (size_t)st->length * sizeof(double));
    st->position = st->length;
}

/* Samples that can be run before the interval, the line or the block ends. */
static long room(const settings *s, const state *st, long into, long left)
{
    long most = s->every - into;
    if (most > st->size - st->position) most = st->size - st->position;
    return most < left ? most : left;
}

static void run_channel(const settings *s, state *st, int c, long into, const double *restrict x, double *restrict y, long frames)
{
    const double a = s->damping, b = s->low_cut, g = s->feedback, dry = s->dry, wet = s->wet / sqrt(s->voices), part = 1.0 / s->every;
    const double loop_from = st->loop_from[c], loop_slope = (st->loop_to[c] - loop_from) * part;
    const int voices = s->voices;
    double from[MAX_VOICES], slope[MAX_VOICES], low = st->low[c], before = st->before[c], high = st->high[c];
    for (int v = 0; v < voices; v++) {
        from[v] = st->from[c][v];
        slope[v] = (st->to[c][v] - from[v]) * part;
    }
    double *now = st->line[c] + st->position;
    for (long i = 0; i < frames; i++, now++) {
        double delay = loop_from + loop_slope * (into + i);
        int whole = (int)delay;
        double q = now[-whole] + (delay - whole) * (now[-whole - 1] - now[-whole]);
        low = (1 - a) * q + a * low;
        high = (1 + b) / 2 * (low - before) + b * high;
        before = low;
        *now = x[i] + g * high;
        double m = 0;
        for (int v = 0; v < voices; v++) {
            delay = from[v] + slope[v] * (into + i);
            whole = (int)delay;
            double f = delay - whole;
            const double *p = now - whole;
            m += f * (f - 1) * ((f + 1) * p[-2] - (f - 2) * p[1]) * (1.0 / 6) + (f + 1) * (f - 2) * ((f - 1) * p[0] - f * p[-1]) * 0.5;
        }
        y[i] = dry * x[i] + wet * m;
    }
    st->low[c] = low;
    st->before[c] = before;
    st->high[c] = high;
}

/* The same channel in the engine's passes: while a delay stays between two samples its points follow one another. */
static void run_passes(const settings *s, state *st, int c, long into, const double *restrict x, double *restrict y, long frames)
{
    const double a = s->damping, b = s->low_cut, g = s->feedback, dry = s->dry, wet = s->wet / sqrt(s->voices), part = 1.0 / s->every;
    const double loop_from = st->loop_from[c], loop_slope = (st->loop_to[c] - loop_from) * part;
    double low = st->low[c], before = st->before[c], high = st->high[c], m[64] = {0};
    double *now = st->line[c] + st->position;
    for (long i = 0; i < frames; i++) {
        double delay = loop_from + loop_slope * (into + i);
        int whole = (int)delay;
        double q = now[i - whole] + (delay - whole) * (now[i - whole - 1] - now[i - whole]);
        low = (1 - a) * q + a * low;
        high = (1 + b) / 2 * (low - before) + b * high;
        before = low;
        now[i] = x[i] + g * high;
    }
    for (int v = 0; v < s->voices; v++) {
        const double from = st->from[c][v], slope = (st->to[c][v] - from) * part;
        for (long i = 0; i < frames;) {
            int whole = (int)(from + slope * (into + i));
            long stop = frames;
            if ((int)(from + slope * (into + frames - 1)) != whole) {
                stop = i + 1;
                while ((int)(from + slope * (into + stop)) == whole) stop++;
            }
            const double *p = now - whole;
            for (long j = i; j < stop; j++) {
                double f = from + slope * (into + j) - whole, e = p[j - 1] - p[j], dd = e - (p[j] - p[j + 1]), older = p[j - 2] - p[j - 1] - e;
                m[j] += p[j] + f * (e + 0.5 * (f - 1) * (dd + (1.0 / 3) * (f + 1) * (older - dd)));
            }
            i = stop;
        }
    }
    for (long i = 0; i < frames; i++) y[i] = dry * x[i] + wet * m[i];
    st->low[c] = low;
    st->before[c] = before;
    st->high[c] = high;
}

static void run_mono(const settings *s, state *st, long into, const double *restrict x, double *restrict y, long frames)
{
    const double g = s->feedback, dry = s->dry, wet = s->wet, part = 1.0 / s->every;
    const double loop_from = st->loop_from[0], loop_slope = (st->loop_to[0] - loop_from) * part;
    const double from = st->from[0][0], slope = (st->to[0][0] - from) * part;
    double *now = st->line[0] + st->position;
    for (long i = 0; i < frames; i++, now++) {
        double delay = loop_from + loop_slope * (into + i);
        int whole = (int)delay;
        *now = x[i] + g * (now[-whole] + (delay - whole) * (now[-whole - 1] - now[-whole]));
        delay = from + slope * (into + i);
        whole = (int)delay;
        y[i] = dry * x[i] + wet * (now[-whole] + (delay - whole) * (now[-whole - 1] - now[-whole]));
    }
}

static void run(const settings *s, state *st, double *const *x, double *const *y, long frames)
{
    for (long i = 0; i < frames;) {
        long into = st->n % s->every;
        if (into == 0) enter(s, st);
        long n = room(s, st, into, frames - i);
        if (s->channels == 1) run_mono(s, st, into, x[0] + i, y[0] + i, n);
        else
            for (int c = 0; c < 2; c++) (s->passes ? run_passes : run_channel)(s, st, c, into, x[c] + i, y[c] + i, n);
        i += n;
        st->n += n;
        st->position += n;
        if (st->position == st->size) rewind_lines(s, st);
    }
}

static void reset(state *st)
{
    double *line[2] = {st->line[0], st->line[1]};
    long length = st->length, size = st->size;
    memset(st, 0, sizeof *st);
    st->length = length;
    st->size = size;
    st->position = length;
    for (int c = 0; c < 2; c++) {
        st->line[c] = line[c];
        memset(line[c], 0, (size_t)size * sizeof(double));
    }
}

static settings read_settings(int stereo)
{
    settings s = {.fs = 48000, .rate_hz = 0.4, .phase_spread = 360, .stereo_phase = 90, .feedback = 0.5, .dry = 0.7, .wet = 0.7, .every = 16};
    s.channels = stereo ? 2 : 1;
    s.voices = stereo ? 4 : 1;
    s.base_ms = stereo ? 12 : 3;
    s.depth_ms = stereo ? 2.5 : 2;
    s.spread_ms = stereo ? 4 : 0;
    s.damping = exp(-2 * PI * 6000 / s.fs);
    s.low_cut = exp(-2 * PI * 80 / s.fs);
    return s;
}

int main(int argc, char **argv)
{
    if (argc != 4) return 2;
    int stereo = strcmp(argv[1], "mono") != 0;
    long frames = atol(argv[2]);
    volatile settings from_outside = read_settings(stereo); /* so that nothing is folded into the loops */
    settings s = from_outside;
    s.passes = strcmp(argv[1], "passes") == 0;
    double *x[2], *y[2];
    FILE *file = fopen(argv[3], "rb");
    if (!file) return 2;
    for (int c = 0; c < s.channels; c++) {
        x[c] = malloc((size_t)frames * sizeof(double));
        y[c] = calloc((size_t)frames, sizeof(double));
        if (!x[c] || !y[c] || fread(x[c], sizeof(double), (size_t)frames, file) != (size_t)frames) return 2;
    }
    fclose(file);
    state st = {.length = 1024, .size = 2048};
    for (int c = 0; c < 2; c++) st.line[c] = malloc(2048 * sizeof(double));
    char word[16];
    while (fgets(word, sizeof word, stdin)) {
        struct timespec begin, end;
        reset(&st);
        clock_gettime(CLOCK_MONOTONIC, &begin);
        run(&s, &st, x, y, frames);
        clock_gettime(CLOCK_MONOTONIC, &end);
        if (strncmp(word, "dump", 4) == 0) {
            for (int c = 0; c < s.channels; c++) fwrite(y[c], sizeof(double), (size_t)frames, stdout);
        } else {
            printf("%.0f\n", (double)(end.tv_sec - begin.tv_sec) * 1e9 + (double)(end.tv_nsec - begin.tv_nsec));
        }
        fflush(stdout);
    }
    return 0;
}
