/* density_table.c - generated from densities.csv by densities.awk: change those. */
#include "beamhours/physics/form_factor.h"

/* clang-format off */
static const double set_1[] = {5.0, 0.02002, 0.041934, 0.036254, 0.017941, 0.0046608, 0.0046834, 0.0052042, 0.003828, 0.0025661, 0.0014182, 0.0006139, 0.00022929};
static const double set_2[] = {8.0, 0.015721, 0.038732, 0.036808, 0.014671, -0.0043277, -0.0097752, -0.0068908, -0.0027631, -0.00063568, 7.1809e-05, 0.00018441, 7.5066e-05, 5.1069e-05, 1.4308e-05, 2.317e-06, 6.8465e-07};
static const double set_3[] = {8.0, 0.015737, 0.038897, 0.037085, 0.014795, -0.0044831, -0.010057, -0.0068696, -0.0028813, -0.00077229, 6.6908e-05, 0.00010636, -3.6864e-05, -5.0135e-06, 9.455e-06, -4.7687e-06};
static const double set_4[] = {7.0, 0.025491, 0.050618, 0.029822, -0.0055196, -0.015913, -0.0076184, -0.0023992, -0.0004794};
static const double set_5[] = {8.0, 0.020238, 0.044793, 0.033533, 0.003503, -0.012293, -0.010329, -0.0034036, -0.00041627, -0.00094435, -0.00025771, 0.00023759, -0.00010603, 4.148e-05};
static const double set_6[] = {7.0, 0.043418, 0.060298, 0.002895, -0.023522, -0.0079791, 0.002301, 0.0010794, 0.00012574, -0.00013021, 5.6563e-05, -1.8011e-05, 4.2869e-06};
static const double set_7[] = {8.0, 0.033495, 0.059533, 0.020979, -0.0169, -0.014998, -0.00093248, 0.0033266, 0.00059244, -0.00040013, 0.00012242, -1.2994e-05, -9.2784e-06, 7.2595e-06, -4.2096e-06};
static const double set_8[] = {9.0, 0.030451, 0.055337, 0.020203, -0.016765, -0.013578, -4.3204e-05, 0.00091988, -0.00041205, 0.00011971, -1.9801e-05, -4.3204e-06, 6.1205e-06, -3.7803e-06, 1.8001e-06, -7.7407e-07};
static const double set_9[] = {8.0, 0.044846, 0.061326, -0.0016818, -0.026217, -0.0029725, 0.0085534, 0.0035322, -0.00048258, -0.00039346, 0.00020338, 2.5461e-05, -1.7794e-05, 6.7394e-06, -2.1033e-06};
static const double set_10[] = {8.0, 0.044782, 0.059523, -0.0074148, -0.029466, -0.0002835, 0.010829, 0.0030465, -0.0010237, -0.0001783, 5.5391e-05, -2.2644e-05, 8.2671e-06, -2.7343e-06, 8.2461e-07, -2.278e-07};
static const double set_11[] = {10.0, 0.02785, 0.055432, 0.026369, -0.017091, -0.021798, -0.0024889, 0.0076631, 0.0034554, -0.00067477, 0.00010764, -1.6564e-06, -5.5566e-06};
static const double set_12[] = {9.0, 0.039287, 0.062477, 0.0062482, -0.032885, -0.010648, 0.01052, 0.0085478, -0.00024003, -0.0020499, -0.0012001, -0.00056649};
static const double set_13[] = {9.0, 0.042018, 0.062337, 0.00023995, -0.032776, -0.0079941, 0.010844, 0.0049123, -0.0022144, -0.00018146, 0.00037261, -0.00023296, 0.00011494, -5.0596e-05, 2.0652e-05, -7.9428e-06, 2.8986e-06, -1.0075e-06};
static const double set_14[] = {9.0, 0.04488, 0.064756, -0.0027899, -0.037016, -0.0071915, 0.013594, 0.0066331, -0.0014095, -0.0010141, 0.00038616, -0.00013871, 4.7788e-05, -1.5295e-05, 5.9131e-06, -6.788e-06};
static const double set_15[] = {9.0, 0.043133, 0.061249, -0.0032523, -0.032681, -0.0049583, 0.011494, 0.0055428, 0.00031398, -7.0578e-05, 5.3725e-06, -7.465e-07, 1.9793e-06, -2.8059e-06, 2.7183e-06, -1.9454e-06, 1.0963e-06, -5.1114e-07};
static const double set_16[] = {9.0, 0.045598, 0.060706, -0.0078616, -0.031638, -0.0014447, 0.010953, 0.0042578, -0.00024224, -0.00030067, 0.00023903, -0.0001291, 6.0195e-05, -2.5755e-05, 1.0332e-05, -3.933e-06, 1.4254e-06, -4.9221e-07};
static const double set_17[] = {10.0, 0.046188, 0.061795, -0.012315, -0.036915, 0.0025175, 0.015234, -0.00055146, -0.0060631, -0.0012198, 0.000362, -0.00016466, 5.3305e-05, -5.0873e-06, -8.5658e-06, 8.6095e-06};
static const double set_18[] = {12.0, 0.030661, 0.058828, 0.020396, -0.02883, -0.025077, 0.0044768, 0.013127, 0.0019548, -0.0061403, -0.0035825, 0.0007379, 0.00061882, -0.00040556, -5.5748e-06, -0.00012453, -5.7812e-05, -2.1657e-05};
static const double set_19[] = {12.0, 0.030483, 0.057207, 0.017888, -0.028388, -0.021778, 0.005678, 0.011236, 0.00082176, -0.005039, -0.0023877, 0.00071492, 0.00029839, -0.00031408, 0.00080177, 4.3682e-05, -5.1394e-05, 2.2293e-05};
static const double set_20[] = {12.0, 0.05088, 0.050679, -0.039771, -0.031403, 0.02812, 0.01058, -0.016402, -0.0031958, 0.0069355, 0.00070777, -0.00014961, 0.00024032, -0.00029939, 0.00020003, -0.0001587};
static const double set_21[] = {12.0, 0.051936, 0.050768, -0.039646, -0.028218, 0.028916, 0.009891, -0.014388, -0.00098262, 0.0072578, 0.00082318, -0.0014823, 0.00013245, -8.4345e-05, 4.8417e-05, -2.6562e-05, 1.4035e-05, -7.1863e-06};
static const double set_22[] = {11.0, 0.062732, 0.038542, -0.055105, -0.002699, 0.031016, -0.0099486, -0.0093012, 0.0076653, 0.0020885, -0.001784, 7.4876e-05, 0.00032278, -0.00011353};
static const double set_23[] = {0.8, 0.1, 0.5, 0.9, 1.3, 1.6, 2, 2.4, 2.9, 3.4, 4, 4.6, 5.2, 0.027614, 0.170847, 0.219805, 0.170486, 0.134453, 0.100953, 0.07431, 0.05397, 0.023689, 0.017502, 0.002034, 0.004338};
static const double set_24[] = {1.0, 0.2, 0.6, 0.9, 1.4, 1.9, 2.3, 2.6, 3.1, 3.5, 4.2, 4.9, 5.2, 0.034724, 0.430761, 0.203166, 0.192986, 0.083866, 0.033007, 0.014201, 0, 0.00686, 0, 0.000438, 0};
static const double set_25[] = {1.2, 0, 0.4, 1, 1.3, 1.7, 2.3, 2.7, 3.5, 4.3, 5.4, 6.7, 0.01669, 0.050325, 0.128621, 0.180515, 0.219097, 0.278416, 0.058779, 0.057817, 0.007739, 0.002001, 7e-06};
static const double set_26[] = {1.3, 0.4, 1.1, 1.9, 2.2, 2.7, 3.3, 4.1, 4.6, 5.3, 5.6, 5.9, 6.4, 0.057056, 0.195701, 0.311188, 0.224321, 0.059946, 0.135714, 2.4e-05, 0.013961, 7e-06, 2e-06, 0.002096, 2e-06};
static const double set_27[] = {1.3, 0.4, 1, 1.9, 2.4, 3.2, 3.6, 4.1, 4.6, 5.1, 5.5, 6, 6.9, 0.033149, 0.106452, 0.206866, 0.286391, 0.250448, 0.056944, 0.016829, 0.03963, 2e-06, 0.000938, 2e-06, 0.002366};
static const double set_28[] = {1.45, 0.4, 1.2, 1.8, 2.7, 3.2, 3.6, 4.3, 4.6, 5.4, 6.3, 6.6, 8.1, 0.04287, 0.05602, 0.167853, 0.317962, 0.15545, 0.161897, 0.053763, 0.032612, 0.004803, 0.004541, 1.5e-05, 0.002218};
static const double set_29[] = {1.6, 0.1, 0.7, 1.3, 1.8, 2.3, 3.1, 3.8, 4.8, 5.5, 6.1, 7.1, 8.1, 0.005727, 0.009643, 0.038209, 0.009466, 0.096665, 0.09784, 0.269373, 0.396671, 0.02639, 0.048157, 0.001367, 0.000509};
static const double set_30[] = {1.6, 0.1, 0.7, 1.3, 1.8, 2.3, 3.1, 3.8, 4.8, 5.5, 6.1, 7.1, 8.1, 0.004877, 0.010685, 0.030309, 0.015857, 0.088927, 0.091917, 0.257379, 0.401877, 0.053646, 0.043193, 0.001319, 3.6e-05};
static const double set_31[] = {1.7, 0.1, 0.7, 1.6, 2.1, 2.7, 3.5, 4.2, 5.1, 6, 6.6, 7.6, 8.7, 0.003845, 0.009724, 0.033093, 0.00012, 0.083107, 0.080869, 0.139957, 0.260892, 0.336013, 0.033637, 0.018729, 2e-05};
static const double set_32[] = {1.772, 0.327};
static const double set_33[] = {1.776, 0.631};
static const double set_34[] = {1.718, 0.837};
static const double set_35[] = {1.698, 0.811};
static const double set_36[] = {1.687, 1.067};
static const double set_37[] = {1.76, 1.234};
static const double set_38[] = {1.729, 1.291};
static const double set_39[] = {1.83314, 1.544};
static const double set_40[] = {0.964, 0.322, 0.517};
static const double set_41[] = {1.008, 0.327, 0.445};
static const double set_42[] = {2.355, 0.5224, -0.149};
static const double set_43[] = {2.57, 0.5052, -0.1807};
static const double set_44[] = {2.608, 0.513, -0.051};
static const double set_45[] = {2.58, 0.567, 0.0};
static const double set_46[] = {2.791, 0.698, -0.168};
static const double set_47[] = {3.07, 0.519, 0.0};
static const double set_48[] = {2.84, 0.569, 0.0};
static const double set_49[] = {3.34, 0.58, -0.233};
static const double set_50[] = {3.3409, 0.5803, -0.2339};
static const double set_51[] = {3.53, 0.542, 0.0};
static const double set_52[] = {3.76623, 0.5865, -0.16123};
static const double set_53[] = {3.6685, 0.5839, -0.1017};
static const double set_54[] = {3.7369, 0.5245, -0.03};
static const double set_55[] = {3.84315, 0.5885, 0.0};
static const double set_56[] = {4.074, 0.536, 0.0};
static const double set_57[] = {4.106, 0.519, 0.0};
static const double set_58[] = {4.111, 0.558, 0.0};
static const double set_59[] = {4.3092, 0.5169, -0.1308};
static const double set_60[] = {4.4891, 0.5369, -0.2668};
static const double set_61[] = {4.218, 0.596, 0.0};
static const double set_62[] = {4.252, 0.589, 0.0};
static const double set_63[] = {4.87, 0.573, 0.0};
static const double set_64[] = {5.315, 0.576, 0.0};
static const double set_65[] = {6.38, 0.64, 0.0};
static const double set_66[] = {6.51, 0.535, 0.0};
static const double set_67[] = {6.58, 0.48, 0.0};
static const double set_68[] = {6.38, 0.535, 0.0};
static const double set_69[] = {6.624, 0.549, 0.0};
static const double set_70[] = {6.805, 0.605, 0.0};
static const double set_71[] = {4.434, 2.5283, 0.35025};
static const double set_72[] = {2.549, 2.1911, 0.16112};

/* z, a, shape, count, values, rms, radius, its uncertainty, confirmed, source, note */
const bh_density bh_density_table[] = {
    {2, 3, BH_SHAPE_FOURIER_BESSEL, 13, set_1, 1.8695, 1.9661, 0.003, true,
     "Amroun et al., Nucl. Phys. A 579 (1994) 596; de Vries et al., At. Data Nucl. Data Tables 36 (1987) 495",
     ""},
    {6, 12, BH_SHAPE_FOURIER_BESSEL, 17, set_2, 2.4715, 2.4702, 0.0022, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     "another copy has the tenth coefficient ten times smaller"},
    {6, 12, BH_SHAPE_FOURIER_BESSEL, 16, set_3, 2.4639, 2.4702, 0.0022, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {7, 15, BH_SHAPE_FOURIER_BESSEL, 9, set_4, 2.6114, 2.6058, 0.008, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {8, 16, BH_SHAPE_FOURIER_BESSEL, 14, set_5, 2.7366, 2.6991, 0.0052, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {13, 27, BH_SHAPE_FOURIER_BESSEL, 13, set_6, 3.0352, 3.061, 0.0031, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {14, 28, BH_SHAPE_FOURIER_BESSEL, 15, set_7, 3.0845, 3.1224, 0.0024, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {18, 40, BH_SHAPE_FOURIER_BESSEL, 16, set_8, 3.4235, 3.4274, 0.0026, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {20, 40, BH_SHAPE_FOURIER_BESSEL, 15, set_9, 3.4500, 3.4776, 0.0019, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {20, 48, BH_SHAPE_FOURIER_BESSEL, 16, set_10, 3.4510, 3.4771, 0.002, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {22, 48, BH_SHAPE_FOURIER_BESSEL, 13, set_11, 3.5971, 3.5921, 0.0017, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {24, 52, BH_SHAPE_FOURIER_BESSEL, 12, set_12, 3.6434, 3.6452, 0.0042, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {26, 56, BH_SHAPE_FOURIER_BESSEL, 18, set_13, 3.7138, 3.7377, 0.0016, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {28, 58, BH_SHAPE_FOURIER_BESSEL, 16, set_14, 3.7687, 3.7757, 0.002, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {27, 59, BH_SHAPE_FOURIER_BESSEL, 18, set_15, 3.7877, 3.7875, 0.0021, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {29, 63, BH_SHAPE_FOURIER_BESSEL, 18, set_16, 3.8848, 3.8823, 0.0015, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {40, 90, BH_SHAPE_FOURIER_BESSEL, 16, set_17, 4.2581, 4.2694, 0.001, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {42, 94, BH_SHAPE_FOURIER_BESSEL, 18, set_18, 4.3328, 4.3529, 0.0013, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     "the last coefficients in the copy read are suspect"},
    {42, 98, BH_SHAPE_FOURIER_BESSEL, 18, set_19, 4.3880, 4.4091, 0.0018, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     "the last coefficients in the copy read are suspect"},
    {80, 204, BH_SHAPE_FOURIER_BESSEL, 16, set_20, 5.4749, 5.4744, 0.0036, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     "one coefficient was hardly legible in the copy read"},
    {82, 208, BH_SHAPE_FOURIER_BESSEL, 18, set_21, 5.5032, 5.5012, 0.0013, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {82, 208, BH_SHAPE_FOURIER_BESSEL, 14, set_22, 5.4993, 5.5012, 0.0013, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {2, 3, BH_SHAPE_GAUSSIANS, 25, set_23, 1.9593, 1.9661, 0.003, true,
     "Amroun et al., Nucl. Phys. A 579 (1994) 596; de Vries et al., At. Data Nucl. Data Tables 36 (1987) 495",
     ""},
    {2, 4, BH_SHAPE_GAUSSIANS, 25, set_24, 1.6764, 1.6755, 0.0028, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {6, 12, BH_SHAPE_GAUSSIANS, 23, set_25, 2.4693, 2.4702, 0.0022, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {8, 16, BH_SHAPE_GAUSSIANS, 25, set_26, 2.7109, 2.6991, 0.0052, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {14, 28, BH_SHAPE_GAUSSIANS, 25, set_27, 3.1206, 3.1224, 0.0024, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {20, 40, BH_SHAPE_GAUSSIANS, 25, set_28, 3.4797, 3.4776, 0.0019, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {50, 116, BH_SHAPE_GAUSSIANS, 25, set_29, 4.6265, 4.625, 0.0019, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {50, 124, BH_SHAPE_GAUSSIANS, 25, set_30, 4.6768, 4.6735, 0.0023, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {82, 208, BH_SHAPE_GAUSSIANS, 25, set_31, 5.5031, 5.5012, 0.0013, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {3, 7, BH_SHAPE_OSCILLATOR, 2, set_32, 2.3965, 2.444, 0.042, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {4, 9, BH_SHAPE_OSCILLATOR, 2, set_33, 2.5030, 2.519, 0.012, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {5, 10, BH_SHAPE_OSCILLATOR, 2, set_34, 2.4638, 2.4277, 0.0499, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {5, 11, BH_SHAPE_OSCILLATOR, 2, set_35, 2.4305, 2.406, 0.0294, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {6, 12, BH_SHAPE_OSCILLATOR, 2, set_36, 2.4537, 2.4702, 0.0022, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {7, 14, BH_SHAPE_OSCILLATOR, 2, set_37, 2.5802, 2.5582, 0.007, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {7, 14, BH_SHAPE_OSCILLATOR, 2, set_38, 2.5408, 2.5582, 0.007, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {8, 16, BH_SHAPE_OSCILLATOR, 2, set_39, 2.7180, 2.6991, 0.0052, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {2, 4, BH_SHAPE_FERMI_3P, 3, set_40, 1.7054, 1.6755, 0.0028, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {2, 4, BH_SHAPE_FERMI_3P, 3, set_41, 1.7168, 1.6755, 0.0028, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {6, 12, BH_SHAPE_FERMI_3P, 3, set_42, 2.4475, 2.4702, 0.0022, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {7, 14, BH_SHAPE_FERMI_3P, 3, set_43, 2.5172, 2.5582, 0.007, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {8, 16, BH_SHAPE_FERMI_3P, 3, set_44, 2.7264, 2.6991, 0.0052, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {9, 19, BH_SHAPE_FERMI_2P, 3, set_45, 2.9041, 2.8976, 0.0025, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {10, 20, BH_SHAPE_FERMI_3P, 3, set_46, 2.9486, 3.0055, 0.0021, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {13, 27, BH_SHAPE_FERMI_2P, 3, set_47, 3.0621, 3.061, 0.0031, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {13, 27, BH_SHAPE_FERMI_2P, 3, set_48, 3.0515, 3.061, 0.0031, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {14, 28, BH_SHAPE_FERMI_3P, 3, set_49, 3.0755, 3.1224, 0.0024, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {14, 28, BH_SHAPE_FERMI_3P, 3, set_50, 3.0750, 3.1224, 0.0024, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {18, 40, BH_SHAPE_FERMI_2P, 3, set_51, 3.3964, 3.4274, 0.0026, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {20, 40, BH_SHAPE_FERMI_3P, 3, set_52, 3.4819, 3.4776, 0.0019, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {20, 40, BH_SHAPE_FERMI_3P, 3, set_53, 3.4799, 3.4776, 0.0019, false,
     "from memory, unconfirmed",
     ""},
    {20, 48, BH_SHAPE_FERMI_3P, 3, set_54, 3.4692, 3.4771, 0.002, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {22, 48, BH_SHAPE_FERMI_2P, 3, set_55, 3.6942, 3.5921, 0.0017, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {26, 54, BH_SHAPE_FERMI_2P, 3, set_56, 3.7320, 3.6933, 0.0019, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {26, 56, BH_SHAPE_FERMI_2P, 3, set_57, 3.7199, 3.7377, 0.0016, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {26, 56, BH_SHAPE_FERMI_2P, 3, set_58, 3.8003, 3.7377, 0.0016, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {28, 58, BH_SHAPE_FERMI_3P, 3, set_59, 3.7642, 3.7757, 0.002, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {28, 60, BH_SHAPE_FERMI_3P, 3, set_60, 3.7961, 3.8118, 0.0016, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {29, 63, BH_SHAPE_FERMI_2P, 3, set_61, 3.9475, 3.8823, 0.0015, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {29, 65, BH_SHAPE_FERMI_2P, 3, set_62, 3.9549, 3.9022, 0.0014, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {41, 93, BH_SHAPE_FERMI_2P, 3, set_63, 4.3321, 4.324, 0.0017, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {50, 120, BH_SHAPE_FERMI_2P, 3, set_64, 4.6405, 4.6519, 0.0021, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {73, 181, BH_SHAPE_FERMI_2P, 3, set_65, 5.4847, 5.3507, 0.0034, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {74, 184, BH_SHAPE_FERMI_2P, 3, set_66, 5.4206, 5.3658, 0.0023, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {74, 184, BH_SHAPE_FERMI_2P, 3, set_67, 5.4001, 5.3658, 0.0023, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     "the copy read does not state the isotope"},
    {79, 197, BH_SHAPE_FERMI_2P, 3, set_68, 5.3271, 5.4371, 0.0038, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {82, 208, BH_SHAPE_FERMI_2P, 3, set_69, 5.5219, 5.5012, 0.0013, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {92, 238, BH_SHAPE_FERMI_2P, 3, set_70, 5.7308, 5.8571, 0.0033, false,
     "from memory, unconfirmed",
     "spherical part of a deformed nucleus"},
    {40, 90, BH_SHAPE_GAUSS_3P, 3, set_71, 4.2746, 4.2694, 0.001, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
    {16, 32, BH_SHAPE_GAUSS_3P, 3, set_72, 3.2407, 3.2611, 0.0018, true,
     "de Jager et al., At. Data Nucl. Data Tables 14 (1974) 479; de Vries et al., ibid. 36 (1987) 495",
     ""},
};
/* clang-format on */
const size_t bh_density_table_size = sizeof bh_density_table / sizeof bh_density_table[0];
