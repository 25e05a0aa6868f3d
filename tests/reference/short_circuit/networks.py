"""Short-circuit currents of three small networks by pandapower, a general-purpose network library, as a second opinion.

Not run by the tests. To make the file anew:

    pip install pandapower==3.5.6
    python networks.py > networks.csv

The networks are invented; `second_opinion.rs` states the same ones.
"""

import csv
import sys

import pandapower as pp
import pandapower.shortcircuit as sc


def feeder_transformer_cable():
    net = pp.create_empty_network(f_hz=50)
    high = pp.create_bus(net, vn_kv=110)
    low = pp.create_bus(net, vn_kv=20)
    end = pp.create_bus(net, vn_kv=20)
    pp.create_ext_grid(net, high, s_sc_max_mva=3000, rx_max=0.1, x0x_max=1.0, r0x0_max=0.1)
    pp.create_transformer_from_parameters(
        net, high, low, sn_mva=40, vn_hv_kv=110, vn_lv_kv=20, vk_percent=12, vkr_percent=0.5, pfe_kw=0, i0_percent=0,
        vector_group="Dyn", vk0_percent=12, vkr0_percent=0.5, mag0_percent=100, mag0_rx=0, si0_hv_partial=0.9)
    pp.create_line_from_parameters(
        net, low, end, length_km=3, r_ohm_per_km=0.125, x_ohm_per_km=0.11, c_nf_per_km=0, max_i_ka=1,
        r0_ohm_per_km=0.5, x0_ohm_per_km=0.33, c0_nf_per_km=0, endtemp_degree=20)
    return net, {"low": low, "end": end}


def generator():
    net = pp.create_empty_network(f_hz=50)
    bus = pp.create_bus(net, vn_kv=10)
    pp.create_gen(net, bus, p_mw=40, sn_mva=50, vn_kv=10.5, xdss_pu=0.15, rdss_ohm=0.005, cos_phi=0.85, pg_percent=0)
    return net, {"terminals": bus}


def feeder_and_motor():
    net = pp.create_empty_network(f_hz=50)
    bus = pp.create_bus(net, vn_kv=6)
    pp.create_ext_grid(net, bus, s_sc_max_mva=250, rx_max=0.1)
    pp.create_motor(
        net, bus, pn_mech_mw=4, cos_phi=0.88, cos_phi_n=0.88, efficiency_n_percent=96, vn_kv=6, rx=0.1,
        lrc_pu=5, efficiency_percent=96)
    return net, {"bus": bus}


def main():
    out = csv.writer(sys.stdout, lineterminator="\n")
    out.writerow(["network", "bus", "quantity", "ka", "status", "source", "call"])
    source = f"pandapower {pp.__version__}"
    for build in (feeder_transformer_cable, generator, feeder_and_motor):
        faults = ["3ph", "2ph"] + (["1ph"] if build is feeder_transformer_cable else [])
        for fault in faults:
            peak = fault == "3ph"
            # The thermal current of the library is for faults far from generators.
            heat = peak and build is feeder_transformer_cable
            net, buses = build()
            options = f"fault='{fault}', case='max', ip={peak}, ith={heat}, tk_s=1.0, kappa_method='C', topology='auto'"
            sc.calc_sc(net, fault=fault, case="max", ip=peak, ith=heat, tk_s=1.0, kappa_method="C", topology="auto")
            for name, bus in buses.items():
                row = net.res_bus_sc.loc[bus]
                found = [("ikss", row.ikss_ka)] + ([("ip", row.ip_ka)] if peak else [])
                found += [("ith", row.ith_ka)] if heat else []
                for quantity, value in found:
                    out.writerow([build.__name__, name, f"{quantity} {fault}", f"{value:.6f}", "V", source, f"calc_sc(net, {options})"])


main()
