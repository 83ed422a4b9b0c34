// Dilute-gas viscosity and conductivity of the catalogue.
//
// NASA: ln(value) = A ln T + B/T + C/T^2 + D, viscosity in 1e-7 Pa s, conductivity
// in 1e-4 W/(m K). Data file of the NASA Glenn equilibrium code; method in R. A.
// Svehla, "Transport Coefficients for the NASA Lewis Chemical Equilibrium Program",
// NASA TM-4647, 1995, and S. Gordon, B. J. McBride, NASA RP-1311, 1994. The rows of
// carbon monoxide repeat those of nitrogen, in the original too.
// Handbook: C1 T^C2 / (1 + C3/T + C4/T^2) in Pa s and W/(m K). Perry's Chemical
// Engineers' Handbook, 8th ed. 2008, tables 2-312 and 2-314 (DIPPR equation 102),
// for the gases without a NASA fit.
// The two agree within about 2 %; beyond that in conductivity: ethane +8 %, carbon
// monoxide +4 %, ammonia -4 % at 300 K; methane +6 %, ethane and nitrous oxide +4 % at 500 K;
// and in viscosity: sulfur dioxide and nitrous oxide +3 % at 500 K (NASA minus handbook).
#include "gas/transport_data.h"

namespace gaskettle {

namespace {

using enum TransportKind;

// clang-format off
constexpr NasaTransportRow nasa[] = {
    // gas, kind, lowest and highest temperature (K), A, B (K), C (K2), D
    // nitrogen: Boushehri et al. (1987) Svehla (1994)
    {"nitrogen", viscosity, 200.0, 1000.0, 6.25265770e-01, -3.17796520e+01, -1.64079830e+03, 1.74549920e+00},
    {"nitrogen", viscosity, 1000.0, 5000.0, 8.73952090e-01, 5.61522220e+02, -1.73948090e+05, -3.93359580e-01},
    {"nitrogen", viscosity, 5000.0, 15000.0, 8.85035510e-01, 9.09021710e+02, -7.31290610e+05, -5.35038380e-01},
    {"nitrogen", conductivity, 200.0, 1000.0, 8.54394360e-01, 1.05732240e+02, -1.23478480e+04, 4.77931280e-01},
    {"nitrogen", conductivity, 1000.0, 5000.0, 8.84071460e-01, 1.33572930e+02, -1.14296400e+04, 2.44170190e-01},
    {"nitrogen", conductivity, 5000.0, 15000.0, 2.41761850e+00, 8.04777490e+03, 3.10558020e+06, -1.45177610e+01},
    // oxygen: Boushehri et al. (1987) Svehla (1994)
    {"oxygen", viscosity, 200.0, 1000.0, 6.09161800e-01, -5.22448470e+01, -5.99740090e+02, 2.04108010e+00},
    {"oxygen", viscosity, 1000.0, 5000.0, 7.22164860e-01, 1.75508390e+02, -5.79748160e+04, 1.09010440e+00},
    {"oxygen", viscosity, 5000.0, 15000.0, 7.39811270e-01, 3.91949060e+02, -3.78331680e+05, 9.09317800e-01},
    {"oxygen", conductivity, 200.0, 1000.0, 7.72291670e-01, 6.84632100e+00, -5.89333770e+03, 1.22103650e+00},
    {"oxygen", conductivity, 1000.0, 5000.0, 9.09173510e-01, 2.91241820e+02, -7.96501710e+04, 6.48516310e-02},
    {"oxygen", conductivity, 5000.0, 15000.0, -1.12182620e+00, -1.92863780e+04, 2.32950110e+07, 2.03420430e+01},
    // argon: Bich et al. (1990)
    {"argon", viscosity, 200.0, 1000.0, 6.12057630e-01, -6.77143540e+01, 1.90406600e+02, 2.15882720e+00},
    {"argon", viscosity, 1000.0, 5000.0, 6.93573340e-01, 7.09539430e+01, -2.83860070e+04, 1.48564470e+00},
    {"argon", viscosity, 5000.0, 15000.0, 7.66089350e-01, 6.78672150e+02, -8.49914170e+05, 7.79351670e-01},
    {"argon", conductivity, 200.0, 1000.0, 6.09689280e-01, -7.08922490e+01, 5.84206240e+02, 1.93371520e+00},
    {"argon", conductivity, 1000.0, 5000.0, 6.90754630e-01, 6.26760580e+01, -2.56674130e+04, 1.26641890e+00},
    {"argon", conductivity, 5000.0, 15000.0, 7.62695020e-01, 6.23417520e+02, -7.18995520e+05, 5.69279180e-01},
    // helium: Bich et al. (1990)
    {"helium", viscosity, 200.0, 1000.0, 7.50159440e-01, 3.57632430e+01, -2.21212910e+03, 9.21263520e-01},
    {"helium", viscosity, 1000.0, 5000.0, 8.33941660e-01, 2.20826560e+02, -5.28525910e+04, 2.08093610e-01},
    {"helium", viscosity, 5000.0, 15000.0, 8.63163490e-01, 9.62051760e+02, -1.24987050e+06, -1.41157140e-01},
    {"helium", conductivity, 200.0, 1000.0, 7.50078330e-01, 3.65779870e+01, -2.36366000e+03, 2.97664750e+00},
    {"helium", conductivity, 1000.0, 5000.0, 8.33192590e-01, 2.21574170e+02, -5.33045300e+04, 2.26845920e+00},
    {"helium", conductivity, 5000.0, 15000.0, 8.59209530e-01, 8.98732060e+02, -1.10692620e+06, 1.95357420e+00},
    // neon: Bich et al. (1990)
    {"neon", viscosity, 200.0, 1000.0, 6.83985110e-01, 1.87323660e+01, -2.36631890e+03, 1.82847550e+00},
    {"neon", viscosity, 1000.0, 5000.0, 7.23334950e-01, 1.04208720e+02, -2.54295450e+04, 1.49424340e+00},
    {"neon", viscosity, 5000.0, 15000.0, 7.75493500e-01, 5.94148500e+02, -6.96707860e+05, 9.78857120e-01},
    {"neon", conductivity, 200.0, 1000.0, 6.85099650e-01, 1.97949240e+01, -2.45255390e+03, 2.25861360e+00},
    {"neon", conductivity, 1000.0, 5000.0, 7.22781220e-01, 1.05282900e+02, -2.63557060e+04, 1.93673370e+00},
    {"neon", conductivity, 5000.0, 15000.0, 7.75894130e-01, 6.12837780e+02, -7.40157050e+05, 1.41140110e+00},
    // krypton: Bich et al. (1990)
    {"krypton", viscosity, 200.0, 1000.0, 5.85977950e-01, -1.29248320e+02, 4.74957590e+03, 2.57936500e+00},
    {"krypton", viscosity, 1000.0, 5000.0, 6.89858450e-01, 5.62963060e+01, -3.60826000e+04, 1.71707150e+00},
    {"krypton", viscosity, 5000.0, 15000.0, 7.65829390e-01, 6.86103770e+02, -8.25371900e+05, 9.75651280e-01},
    {"krypton", conductivity, 200.0, 1000.0, 5.80081390e-01, -1.37925560e+02, 6.07714600e+03, 1.64200390e+00},
    {"krypton", conductivity, 1000.0, 5000.0, 6.88594310e-01, 5.17656470e+01, -3.45121310e+04, 7.43321300e-01},
    {"krypton", conductivity, 5000.0, 15000.0, 7.63654430e-01, 6.51758470e+02, -7.35898000e+05, 1.21121260e-02},
    // xenon: Bich et al. (1990)
    {"xenon", viscosity, 200.0, 1000.0, 5.79884180e-01, -1.88066660e+02, 1.05087230e+04, 2.65021070e+00},
    {"xenon", viscosity, 1000.0, 5000.0, 6.85069450e-01, 4.76717490e+01, -5.47677180e+04, 1.75315460e+00},
    {"xenon", viscosity, 5000.0, 15000.0, 7.54364140e-01, 6.91002480e+02, -7.51405930e+05, 1.06217470e+00},
    {"xenon", conductivity, 200.0, 1000.0, 5.73083280e-01, -1.99914320e+02, 1.28720270e+04, 1.27189310e+00},
    {"xenon", conductivity, 1000.0, 5000.0, 6.83196500e-01, 4.00200920e+01, -5.20384740e+04, 3.36234070e-01},
    {"xenon", conductivity, 5000.0, 15000.0, 7.55936400e-01, 7.29238580e+02, -8.24078340e+05, -3.90254770e-01},
    // hydrogen: Assael et al. (1986) Svehla (1994)
    {"hydrogen", viscosity, 200.0, 1000.0, 7.45531820e-01, 4.35551090e+01, -3.25793400e+03, 1.35562430e-01},
    {"hydrogen", viscosity, 1000.0, 5000.0, 9.67306050e-01, 6.79318970e+02, -2.10251790e+05, -1.82516970e+00},
    {"hydrogen", viscosity, 5000.0, 15000.0, 1.01261290e+00, 1.49737390e+03, -1.44284840e+06, -2.32549280e+00},
    {"hydrogen", conductivity, 200.0, 1000.0, 1.00594610e+00, 2.79512620e+02, -2.97920180e+04, 1.19962520e+00},
    {"hydrogen", conductivity, 1000.0, 5000.0, 1.05824500e+00, 2.48753720e+02, 1.17369070e+04, 8.27586950e-01},
    {"hydrogen", conductivity, 5000.0, 15000.0, -2.23644200e-01, -6.96504420e+03, -7.77713130e+04, 1.31893690e+01},
    // carbon_dioxide: Boushehri et al. (1987) Svehla (1994)
    {"carbon_dioxide", viscosity, 200.0, 1000.0, 5.11372580e-01, -2.29513210e+02, 1.37106780e+04, 2.70755380e+00},
    {"carbon_dioxide", viscosity, 1000.0, 5000.0, 6.39782850e-01, -4.26370760e+01, -1.55226050e+04, 1.66288430e+00},
    {"carbon_dioxide", viscosity, 5000.0, 10000.0, 7.21509120e-01, 7.50128950e+02, -1.18255070e+06, 8.54936450e-01},
    {"carbon_dioxide", conductivity, 200.0, 1000.0, 4.80565680e-01, -5.07867200e+02, 3.50888110e+04, 3.67477940e+00},
    {"carbon_dioxide", conductivity, 1000.0, 5000.0, 6.98572770e-01, -1.18304770e+02, -5.06888590e+04, 1.86505510e+00},
    {"carbon_dioxide", conductivity, 5000.0, 10000.0, 1.05183580e+00, -4.25559440e+03, 1.42886880e+07, -8.89504730e-01},
    // carbon_monoxide: Svehla (1994)
    {"carbon_monoxide", viscosity, 200.0, 1000.0, 6.25265770e-01, -3.17796520e+01, -1.64079830e+03, 1.74549920e+00},
    {"carbon_monoxide", viscosity, 1000.0, 5000.0, 8.73952090e-01, 5.61522220e+02, -1.73948090e+05, -3.93359580e-01},
    {"carbon_monoxide", viscosity, 5000.0, 15000.0, 8.85035510e-01, 9.09021710e+02, -7.31290610e+05, -5.35038380e-01},
    {"carbon_monoxide", conductivity, 200.0, 1000.0, 8.54394360e-01, 1.05732240e+02, -1.23478480e+04, 4.77931280e-01},
    {"carbon_monoxide", conductivity, 1000.0, 5000.0, 8.84071460e-01, 1.33572930e+02, -1.14296400e+04, 2.44170190e-01},
    {"carbon_monoxide", conductivity, 5000.0, 15000.0, 2.41754110e+00, 8.04626710e+03, 3.10907400e+06, -1.45169320e+01},
    // water: Sengers & Watson (1986) Svehla (1994)
    {"water", viscosity, 373.2, 1073.2, 5.00195570e-01, -6.97127960e+02, 8.81638920e+04, 3.08365080e+00},
    {"water", viscosity, 1073.2, 5000.0, 5.89885380e-01, -5.37698140e+02, 5.42635130e+04, 2.33863750e+00},
    {"water", viscosity, 5000.0, 15000.0, 6.43300870e-01, -9.56689130e+01, -3.77422830e+05, 1.81251900e+00},
    {"water", conductivity, 373.2, 1073.2, 1.09663890e+00, -5.55134290e+02, 1.06234080e+05, -2.46645500e-01},
    {"water", conductivity, 1073.2, 5000.0, 3.93679330e-01, -2.25242260e+03, 6.12174580e+05, 5.80113170e+00},
    {"water", conductivity, 5000.0, 15000.0, -4.18587370e-01, -1.40966490e+04, 1.91791900e+07, 1.43456130e+01},
    // methane: Boushehri et al. (1987) Svehla (1994)
    {"methane", viscosity, 200.0, 1000.0, 5.76436220e-01, -9.37040790e+01, 8.69923950e+02, 1.73333470e+00},
    {"methane", viscosity, 1000.0, 5000.0, 6.64000440e-01, 1.08608430e+01, -7.63078410e+03, 1.03239840e+00},
    {"methane", conductivity, 200.0, 1000.0, 1.02381770e+00, -3.10923750e+02, 3.29443090e+04, 6.77874370e-01},
    {"methane", conductivity, 1000.0, 5000.0, 7.74850280e-01, -4.00896270e+02, -4.65510820e+04, 2.56714810e+00},
    // ethane: Boushehri et al. (1987) Svehla (1994)
    {"ethane", viscosity, 200.0, 1000.0, 5.90893480e-01, -1.39944050e+02, 2.98683740e+03, 1.59888660e+00},
    {"ethane", viscosity, 1000.0, 5000.0, 6.60613230e-01, 4.10622200e+01, -5.26562120e+04, 9.91916400e-01},
    {"ethane", conductivity, 200.0, 1000.0, 7.08674900e-01, -6.30165630e+02, 5.09510260e+04, 2.95087240e+00},
    {"ethane", conductivity, 1000.0, 5000.0, 5.79472470e-01, -6.49902280e+02, -3.78067140e+03, 3.91783950e+00},
    // ethylene: Boushehri et al. (1987) Svehla (1994)
    {"ethylene", viscosity, 200.0, 1000.0, 5.91360530e-01, -1.40889380e+02, 3.00128000e+03, 1.70189320e+00},
    {"ethylene", viscosity, 1000.0, 5000.0, 6.60008940e-01, 3.91149990e+01, -5.26764890e+04, 1.10336010e+00},
    {"ethylene", conductivity, 200.0, 1000.0, 2.47366500e-01, -1.05899870e+03, 8.99115680e+04, 6.44560920e+00},
    {"ethylene", conductivity, 1000.0, 5000.0, 5.16160350e-01, -9.24863510e+02, 1.57238870e+05, 4.38738450e+00},
    // ammonia: Zeleznik & Svehla (1970) Svehla (1994)
    {"ammonia", viscosity, 200.0, 1000.0, 5.66524030e-01, -3.67180830e+02, 3.16638440e+04, 2.26474430e+00},
    {"ammonia", viscosity, 1000.0, 5000.0, 5.97610030e-01, -2.80273390e+02, 3.75324570e+03, 1.99101290e+00},
    {"ammonia", conductivity, 200.0, 1000.0, 1.74983870e+00, 2.91952540e+02, -3.30337380e+04, -5.09449850e+00},
    {"ammonia", conductivity, 1000.0, 5000.0, 6.44776730e-01, -9.12947230e+02, 1.68901820e+04, 3.69397510e+00},
    // sulfur_hexafluoride: Boushehri et al. (1987) Svehla (1994)
    {"sulfur_hexafluoride", viscosity, 300.0, 1000.0, 4.97484740e-01, -2.18640840e+02, 1.45099890e+04, 2.76319580e+00},
    {"sulfur_hexafluoride", viscosity, 1000.0, 5000.0, 6.07695890e-01, -1.42309780e+02, 3.14493120e+04, 1.90861370e+00},
    {"sulfur_hexafluoride", conductivity, 300.0, 1000.0, 4.18572580e-01, -1.97336120e+02, -2.56619490e+04, 3.45552070e+00},
    {"sulfur_hexafluoride", conductivity, 1000.0, 5000.0, 6.06339050e-01, 4.44581290e+01, -5.26765090e+04, 1.94369630e+00},
    // nitrous_oxide: Boushehri et al.(1987) Uribe et al.(1990)
    {"nitrous_oxide", viscosity, 200.0, 1000.0, 5.89591120e-01, -1.55651780e+02, 3.76304310e+03, 2.12238530e+00},
    {"nitrous_oxide", viscosity, 1000.0, 5000.0, 6.45714690e-01, -8.88065850e+00, -4.15605590e+04, 1.63324980e+00},
    {"nitrous_oxide", conductivity, 200.0, 1000.0, 6.51653760e-01, -3.43730580e+02, 1.50903990e+04, 2.42423590e+00},
    {"nitrous_oxide", conductivity, 1000.0, 5000.0, 6.47206040e-01, -7.86801950e+01, -1.19657290e+05, 2.32465690e+00},
    // sulfur_dioxide: Zeleznik & Svehla (1970) Svehla (1994)
    {"sulfur_dioxide", viscosity, 300.0, 1000.0, 5.31570840e-01, -2.95898730e+02, 2.12248400e+04, 2.59755490e+00},
    {"sulfur_dioxide", viscosity, 1000.0, 5000.0, 6.07830980e-01, -1.92835810e+02, 7.82320020e+03, 1.98110720e+00},
    {"sulfur_dioxide", conductivity, 300.0, 1000.0, 6.14765510e-01, -5.64092950e+02, 4.95807870e+04, 2.39400640e+00},
    {"sulfur_dioxide", conductivity, 1000.0, 5000.0, 5.36175580e-01, -6.94130850e+02, 7.53049080e+04, 3.04120020e+00},
    // nitric_oxide: Boushehri et al. (1987) Svehla (1994)
    {"nitric_oxide", viscosity, 200.0, 1000.0, 6.02620290e-01, -6.20177830e+01, -1.39545240e+02, 2.02683320e+00},
    {"nitric_oxide", viscosity, 1000.0, 5000.0, 7.80090500e-01, 3.04868910e+02, -9.48477220e+04, 5.28733810e-01},
    {"nitric_oxide", viscosity, 5000.0, 15000.0, 8.05805820e-01, 6.24278780e+02, -5.78792100e+05, 2.65164500e-01},
    {"nitric_oxide", conductivity, 200.0, 1000.0, 9.50287580e-01, 7.66670580e+01, -9.98947640e+03, -6.27767170e-03},
    {"nitric_oxide", conductivity, 1000.0, 5000.0, 8.62152380e-01, 4.45682230e+02, -2.38564660e+05, 4.62098760e-01},
    {"nitric_oxide", conductivity, 5000.0, 15000.0, -1.03778650e+00, -3.44868640e+04, 6.74511870e+07, 2.09287490e+01},
};

constexpr HandbookTransportRow handbook[] = {
    // gas, kind, lowest and highest temperature (K), C1, C2, C3 (K), C4 (K2)
    {"propane", viscosity, 85.47, 1000.0, 4.9054E-08, 0.90125, 0.0, 0.0},
    {"propane", conductivity, 231.11, 1000.0, -1.12, 0.10972, -9834.6, -7535800.0},
    {"air", viscosity, 80.0, 2000.0, 1.425E-06, 0.5039, 108.3, 0.0},
    {"air", conductivity, 70.0, 2000.0, 0.00031417, 0.7786, -0.7116, 2121.7},
};
// clang-format on

}  // namespace

std::span<const NasaTransportRow> nasa_transport() { return nasa; }
std::span<const HandbookTransportRow> handbook_transport() { return handbook; }

}  // namespace gaskettle
