// Critical points and acentric factors of the catalogue, one source each.
#include "gas/critical_data.h"

namespace gaskettle {

namespace {

// clang-format off
constexpr CriticalRow rows[] = {
    // gas, temperature (K), pressure (Pa), molar density (mol/m3), acentric factor, source
    {"nitrogen", 126.192, 3395800.0, 11183.9, 0.0372,
     "Span, Lemmon, Jacobsen, Wagner & Yokozeki 2000, J. Phys. Chem. Ref. Data 29, 1361-1433"},
    {"oxygen", 154.581, 5043000.0, 13630.0, 0.0222,
     "Schmidt & Wagner 1985, Fluid Phase Equilib. 19, 175-200; form also in Stewart, Jacobsen & Wagner 1991, J. Phys. Chem. Ref. Data 20, 917-1021"},
    {"argon", 150.687, 4863000.0, 13407.4296585561, -0.00219,
     "Tegeler, Span & Wagner 1999, J. Phys. Chem. Ref. Data 28, 779-850"},
    {"helium", 5.1953, 228320.0, 17383.7, -0.3836,
     "Ortiz-Vega et al., equation of state of helium-4"},
    {"neon", 44.4918, 2678600.0, 23882.0, -0.0387,
     "Katti, Jacobsen, Stewart & Jahangiri 1986, Adv. Cryog. Eng. 31, 1189-1197"},
    {"krypton", 209.48, 5525000.0, 10850.0, -0.00089,
     "Lemmon & Span 2006, J. Chem. Eng. Data 51, 785-850"},
    {"xenon", 289.733, 5842000.0, 8400.0, 0.00363,
     "Lemmon & Span 2006, J. Chem. Eng. Data 51, 785-850"},
    {"hydrogen", 33.145, 1296400.0, 15508.0, -0.219,
     "Leachman, Jacobsen, Penoncello & Lemmon 2009, J. Phys. Chem. Ref. Data 38, 721-748 (normal hydrogen)"},
    {"carbon_dioxide", 304.1282, 7377300.0, 10624.9063, 0.22394,
     "Span & Wagner 1996, J. Phys. Chem. Ref. Data 25, 1509-1596"},
    {"carbon_monoxide", 132.86, 3494000.0, 10850.0, 0.0497,
     "Lemmon & Span 2006, J. Chem. Eng. Data 51, 785-850"},
    {"water", 647.096, 22064000.0, 17873.7279956091, 0.34429,
     "Wagner & Pruss 2002, J. Phys. Chem. Ref. Data 31, 387-535 (IAPWS-95; IAPWS R6-95)"},
    {"methane", 190.564, 4599200.0, 10139.128, 0.01142,
     "Setzmann & Wagner 1991, J. Phys. Chem. Ref. Data 20, 1061-1155"},
    {"ethane", 305.322, 4872200.0, 6856.886685, 0.0995,
     "Buecker & Wagner 2006, J. Phys. Chem. Ref. Data 35, 205-266"},
    {"propane", 369.89, 4251200.0, 5000.0, 0.1521,
     "Lemmon, McLinden & Wagner 2009, J. Chem. Eng. Data 54, 3141-3180"},
    {"ethylene", 282.35, 5041800.0, 7636.7659807455, 0.0866,
     "Smukala, Span & Wagner 2000, J. Phys. Chem. Ref. Data 29, 1053-1121"},
    {"ammonia", 405.4, 11333000.0, 13211.7771543, 0.25601,
     "Tillner-Roth, Harms-Watzenberg & Baehr 1993, DKV-Tagungsbericht 20, 167-181"},
    {"sulfur_hexafluoride", 318.7232, 3754983.0, 5082.3174111981, 0.2185,
     "Guder & Wagner 2009, J. Phys. Chem. Ref. Data 38, 33-94"},
    {"nitrous_oxide", 309.52, 7245000.0, 10270.0, 0.162,
     "Lemmon & Span 2006, J. Chem. Eng. Data 51, 785-850"},
    {"sulfur_dioxide", 430.64, 7886587.6003464125, 8195.0, 0.25613,
     "Gao, Wu, Zhang & Lemmon 2016, J. Chem. Eng. Data 61, 2859-2872"},
    {"nitric_oxide", 180.0, 6479997.0, 17241.4, 0.588,
     "PSRK parameter table revision 4 (Horstmann et al. 2005), appendix"},
    {"air", 132.5306, 3786000.0, 11830.8, 0.0335,
     "Lemmon et al. 2000 (true critical point of the mixture; reducing point of the equation is 132.6312 K, 10447.7 mol/m3)"},
};
// clang-format on

}  // namespace

std::span<const CriticalRow> critical_rows() { return rows; }

}  // namespace gaskettle
